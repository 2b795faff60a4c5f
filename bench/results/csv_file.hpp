#pragma once
/// \file
/// A CSV file written row by row; trouble with the disk is a SystemFault.
#include <filesystem>
#include <fstream>
#include <string>
#include <string_view>

namespace cistern {

class CsvFile {
 public:
  CsvFile(const std::filesystem::path& path, std::string_view header);
  /// \param line  the fields joined by commas, without a line end
  void add(std::string_view line);
  void close();

 private:
  std::string name_;
  std::ofstream stream_;
};

/// Writes a whole file. SystemFault if it cannot.
void write_whole_file(const std::filesystem::path& path, std::string_view text);

}  // namespace cistern
