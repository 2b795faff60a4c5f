/// \file
/// CSV: comment lines, a header, then one line per sample. Read line by line through one buffer.
#include <fmt/format.h>

#include <charconv>
#include <fstream>

#include "traces/files/csv_header.hpp"
#include "traces/files/file_facts.hpp"
#include "traces/files/formats.hpp"

namespace cistern {
namespace fs = std::filesystem;
namespace {

constexpr std::size_t buffer_size = 1 << 18;
constexpr std::size_t longest_line = 4'096;

/// Lines of a file, counted from 1; accepts CR LF and a last line without an end.
class Lines {
 public:
  explicit Lines(const fs::path& path) : name_(path.string()), stream_(path, std::ios::binary), buffer_(buffer_size) {
    if (!stream_) throw InputError(name_, "cannot be read");
  }

  bool next(std::string_view& line) {
    std::size_t end = find_end();
    if (end == std::string_view::npos) {
      if (begin_ == filled_) return false;
      end = filled_;
    }
    line = {buffer_.data() + begin_, end - begin_};
    begin_ = std::min(end + 1, filled_);
    ++number_;
    if (!line.empty() && line.back() == '\r') line.remove_suffix(1);
    if (line.size() > longest_line) throw InputError(place(), "the line is longer than 4,096 characters");
    if (line.find('\0') != std::string_view::npos) throw InputError(place(), "the line holds a NUL byte; expected text");
    return true;
  }

  [[nodiscard]] std::string place() const { return fmt::format("{}:{}", name_, number_); }
  [[nodiscard]] const std::string& name() const noexcept { return name_; }

 private:
  std::size_t find_end() {
    const std::string_view rest(buffer_.data() + begin_, filled_ - begin_);
    if (const auto at = rest.find('\n'); at != std::string_view::npos) return begin_ + at;
    std::copy(buffer_.begin() + static_cast<std::ptrdiff_t>(begin_), buffer_.begin() + static_cast<std::ptrdiff_t>(filled_), buffer_.begin());
    filled_ -= begin_;
    begin_ = 0;
    stream_.read(buffer_.data() + filled_, static_cast<std::streamsize>(buffer_.size() - filled_));
    filled_ += static_cast<std::size_t>(stream_.gcount());
    if (stream_.bad()) throw SystemFault(name_ + ": cannot be read");
    const auto at = std::string_view(buffer_.data(), filled_).find('\n');
    if (at == std::string_view::npos && filled_ == buffer_.size()) throw InputError(fmt::format("{}:{}", name_, number_ + 1), "the line is longer than 4,096 characters");
    return at;
  }

  std::string name_;
  std::ifstream stream_;
  std::vector<char> buffer_;
  std::size_t begin_{0};
  std::size_t filled_{0};
  std::int64_t number_{0};
};

/// One data line.
struct Row {
  std::int64_t trace{0};
  std::int64_t sample{0};
  std::int16_t codes[16]{};
};

class CsvReader : public TraceReader {
 public:
  explicit CsvReader(const fs::path& path) : lines_(path) {
    read_head();
    info_.samples = count_first_trace(path);
    has_row_ = read_row(row_);
    if (!has_row_) throw InputError(lines_.name(), "has no samples; expected lines after its header");
    if (row_.trace != 0 || row_.sample != 0) {
      throw InputError(lines_.place(), fmt::format("starts with trace {}, sample {}; expected 0, 0", row_.trace, row_.sample));
    }
  }

  [[nodiscard]] const TraceFileInfo& info() const override { return info_; }
  void expect_bits(std::int32_t bits) override {
    if (!info_.bits) bits_ = bits;
    check_row();  // the first row was read before
  }

  bool next(std::size_t max_samples, TraceBlock& block) override {
    if (!has_row_) return false;
    const std::int64_t trace = row_.trace;
    const std::int64_t first = row_.sample;
    std::size_t count = 0;
    codes_.resize(info_.channels, std::min(max_samples, info_.samples - static_cast<std::size_t>(first)));
    while (has_row_ && row_.trace == trace && count < codes_.samples()) {
      for (std::size_t c = 0; c < info_.channels; ++c) codes_.channel(c)[count] = row_.codes[c];
      ++count;
      advance();
    }
    block = {trace, first, !has_row_ || row_.trace != trace, {}, codes_.view().part(0, count)};
    return true;
  }

 private:
  void read_head() {
    std::string_view line;
    std::string seen;
    while (lines_.next(line)) {
      if (!line.empty() && line.front() == '#') {
        read_csv_comment(lines_.place(), line, info_, seen);
        continue;
      }
      info_.channels = read_csv_columns(lines_.place(), line);
      if (info_.baseline_counts) info_.baseline_counts = one_per_channel(lines_.name(), "baseline_counts", *info_.baseline_counts, info_.channels);
      bits_ = info_.bits.value_or(15);
      return;
    }
    throw InputError(lines_.name(), "has no header; expected trace,sample,ch0,ch1,...");
  }

  /// The length of the first trace is that of all: told before the first block.
  [[nodiscard]] static std::size_t count_first_trace(const fs::path& path) {
    Lines lines(path);
    std::string_view line;
    std::size_t samples = 0;
    bool in_data = false;
    while (lines.next(line)) {
      if (in_data && line.substr(0, 2) != "0,") break;
      if (in_data) ++samples;
      in_data = in_data || line.empty() || line.front() != '#';
    }
    return std::max<std::size_t>(samples, 1);
  }

  bool read_row(Row& row) {
    std::string_view line;
    if (!lines_.next(line)) return false;
    const char* at = line.data();
    const char* end = at + line.size();
    read_field(row.trace, at, end, ',');
    read_field(row.sample, at, end, ',');
    for (std::size_t c = 0; c < info_.channels; ++c) {
      std::int64_t code = 0;
      read_field(code, at, end, c + 1 == info_.channels ? '\0' : ',');
      if (code < 0 || code >= (std::int64_t{1} << bits_)) {
        throw InputError(lines_.place(), fmt::format("ch{} is {}, expected a code from 0 to {} ({} bits)", c, code, (1 << bits_) - 1, bits_));
      }
      row.codes[c] = static_cast<std::int16_t>(code);
    }
    return true;
  }

  /// \param separator  '\0': the field ends the line
  void read_field(std::int64_t& value, const char*& at, const char* end, char separator) const {
    const auto [next, error] = std::from_chars(at, end, value);
    if (error != std::errc{}) throw InputError(lines_.place(), fmt::format("expected {} whole numbers joined by commas", info_.channels + 2));
    const bool ends_well = separator == '\0' ? next == end : next != end && *next == separator;
    if (!ends_well) throw InputError(lines_.place(), fmt::format("expected {} whole numbers joined by commas", info_.channels + 2));
    at = separator == '\0' ? next : next + 1;
  }

  void check_row() const {
    for (std::size_t c = 0; c < info_.channels; ++c) {
      if (row_.codes[c] < (1 << bits_)) continue;
      throw InputError(lines_.place(), fmt::format("ch{} is {}, expected a code from 0 to {} ({} bits)", c, row_.codes[c], (1 << bits_) - 1, bits_));
    }
  }

  /// Reads the next row and checks that it follows the last one.
  void advance() {
    const Row last = row_;
    has_row_ = read_row(row_);
    const bool trace_ends = !has_row_ || row_.trace != last.trace;
    if (trace_ends && last.sample + 1 != static_cast<std::int64_t>(info_.samples)) {
      throw InputError(lines_.place(), fmt::format("trace {} has {} samples, expected {} as in the first trace", last.trace, last.sample + 1, info_.samples));
    }
    if (!has_row_) return;
    const std::int64_t expected_trace = trace_ends ? last.trace + 1 : last.trace;
    const std::int64_t expected_sample = trace_ends ? 0 : last.sample + 1;
    if (row_.trace != expected_trace) throw InputError(lines_.place(), fmt::format("trace is {}, expected {}: traces come in order", row_.trace, expected_trace));
    if (row_.sample != expected_sample) throw InputError(lines_.place(), fmt::format("sample is {}, expected {}: samples come from 0 without gaps", row_.sample, expected_sample));
    if (row_.sample >= static_cast<std::int64_t>(info_.samples)) {
      throw InputError(lines_.place(), fmt::format("trace {} has more than {} samples, expected as many as in the first trace", row_.trace, info_.samples));
    }
  }

  Lines lines_;
  TraceFileInfo info_;
  std::int32_t bits_{15};
  Row row_;
  bool has_row_{false};
  Codes codes_;
};

class CsvWriter : public TraceWriter {
 public:
  CsvWriter(const fs::path& path, const TraceFileInfo& info) : name_(path.string()), channels_(info.channels), stream_(path, std::ios::binary | std::ios::trunc) {
    stream_ << csv_head(info);
  }

  void append(const TraceBlock& block) override {
    CISTERN_ASSERT(block.codes.channels() == channels_);
    fmt::memory_buffer text;
    for (std::size_t s = 0; s < block.codes.samples(); ++s) {
      fmt::format_to(std::back_inserter(text), "{},{}", traces_, sample_ + static_cast<std::int64_t>(s));
      for (std::size_t c = 0; c < channels_; ++c) fmt::format_to(std::back_inserter(text), ",{}", block.codes.channel(c)[s]);
      text.push_back('\n');
    }
    stream_.write(text.data(), static_cast<std::streamsize>(text.size()));
    if (!stream_) throw SystemFault(name_ + ": cannot write (is the disk full?)");
    sample_ += static_cast<std::int64_t>(block.codes.samples());
    if (!block.last_of_trace) return;
    ++traces_;
    sample_ = 0;
  }

  void finish(const std::vector<TruthColumn>&) override {
    stream_.close();
    if (stream_.fail()) throw SystemFault(name_ + ": cannot write (is the disk full?)");
  }

 private:
  std::string name_;
  std::size_t channels_;
  std::ofstream stream_;
  std::int64_t traces_{0};
  std::int64_t sample_{0};
};

}  // namespace

std::unique_ptr<TraceReader> open_csv(const fs::path& path) { return std::make_unique<CsvReader>(path); }

std::unique_ptr<TraceWriter> create_csv(const fs::path& temporary, const TraceFileInfo& info) { return std::make_unique<CsvWriter>(temporary, info); }

}  // namespace cistern
