#include "bench/results/csv_file.hpp"

#include "traces/base/errors.hpp"

namespace cistern {

CsvFile::CsvFile(const std::filesystem::path& path, std::string_view header)
    : name_(path.string()), stream_(path, std::ios::binary | std::ios::trunc) {
  add(header);
}

void CsvFile::add(std::string_view line) {
  stream_ << line << '\n';
  if (!stream_) throw SystemFault(name_ + ": cannot write (is the disk full?)");
}

void CsvFile::close() {
  stream_.close();
  if (stream_.fail()) throw SystemFault(name_ + ": cannot write (is the disk full?)");
}

void write_whole_file(const std::filesystem::path& path, std::string_view text) {
  std::ofstream stream(path, std::ios::binary | std::ios::trunc);
  stream << text;
  stream.close();
  if (stream.fail()) throw SystemFault(path.string() + ": cannot write (is the disk full?)");
}

}  // namespace cistern
