#pragma once
/// \file
/// A text file line by line, through one buffer of fixed size. Internal to traces/files.
#include <string>
#include <string_view>
#include <vector>

#include "traces/files/posix_file.hpp"

namespace cistern {

class CsvLines {
 public:
  explicit CsvLines(const std::filesystem::path& path);

  /// The next line without its LF or CR LF, which the last one need not have; false at the end.
  /// \param line  valid until the next call
  [[nodiscard]] bool next(std::string_view& line);
  /// "FILE:LINE" of the line that was read last, counted from 1.
  [[nodiscard]] std::string place() const;
  [[nodiscard]] const std::string& name() const noexcept { return file_.name(); }

 private:
  void fill();

  InputFile file_;
  std::int64_t at_{0};  ///< bytes of the file read so far
  std::vector<char> buffer_;
  std::size_t begin_{0};
  std::size_t end_{0};
  std::int64_t number_{0};
};

}  // namespace cistern
