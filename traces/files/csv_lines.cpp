#include "traces/files/csv_lines.hpp"

#include <fmt/format.h>

#include <cstring>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

constexpr std::size_t buffer_size = 1 << 18;
constexpr std::size_t longest_line = 4'096;  // far more than 18 numbers, or a list of 16, need

}  // namespace

CsvLines::CsvLines(const std::filesystem::path& path) : file_(path), buffer_(buffer_size) {}

bool CsvLines::next(std::string_view& line) {
  if (end_ - begin_ <= longest_line) fill();
  if (begin_ == end_) return false;
  const char* const first = buffer_.data() + begin_;
  const auto* newline = static_cast<const char*>(std::memchr(first, '\n', end_ - begin_));
  const std::size_t length = newline == nullptr ? end_ - begin_ : static_cast<std::size_t>(newline - first);
  ++number_;
  if (length > longest_line) throw InputError(place(), "the line is too long; expected at most 4,096 characters");
  begin_ += length + (newline == nullptr ? 0 : 1);
  line = {first, length};
  if (!line.empty() && line.back() == '\r') line.remove_suffix(1);
  return true;
}

std::string CsvLines::place() const { return fmt::format("{}:{}", name(), number_); }

/// Moves what is left to the front of the buffer and reads behind it.
void CsvLines::fill() {
  std::memmove(buffer_.data(), buffer_.data() + begin_, end_ - begin_);
  end_ -= begin_;
  begin_ = 0;
  const std::size_t got = file_.read_some(buffer_.data() + end_, buffer_.size() - end_, at_);
  at_ += static_cast<std::int64_t>(got);
  end_ += got;
}

}  // namespace cistern
