/// \file
/// CSV: comment lines, a header, then one line per sample. The row after a block is read ahead, since
/// only it tells whether the trace goes on.
#include <fmt/format.h>

#include <algorithm>
#include <utility>

#include "traces/files/csv_header.hpp"
#include "traces/files/csv_lines.hpp"
#include "traces/files/csv_row.hpp"
#include "traces/files/file_facts.hpp"
#include "traces/files/formats.hpp"

namespace cistern {
namespace {

constexpr std::size_t largest_block_codes = 1 << 20;

/// The comments and the header; the lines go on with the first sample.
TraceFileInfo read_head(CsvLines& lines) {
  TraceFileInfo info;
  std::vector<std::string> seen;
  std::string baseline_place;
  std::string_view line;
  while (lines.next(line)) {
    if (line.find('\0') != std::string_view::npos) throw InputError(lines.place(), "holds a NUL byte, expected text");
    if (line.empty() || line.front() != '#') {
      info.channels = read_csv_columns(lines.place(), line);
      if (info.baseline_counts) {
        info.baseline_counts = checked_baselines(baseline_place, *info.baseline_counts, info.channels, info.bits);
      }
      return info;
    }
    read_csv_comment(lines.place(), line, info, seen);
    if (info.baseline_counts && baseline_place.empty()) baseline_place = lines.place();
  }
  throw InputError(lines.name(), "has no header; expected trace,sample,ch0,ch1,...");
}

/// The length of the first trace is that of all, and is told before the first block.
std::size_t count_samples_of_first_trace(const std::filesystem::path& path) {
  CsvLines lines(path);
  (void)read_head(lines);
  std::size_t samples = 0;
  for (std::string_view line; lines.next(line) && line.substr(0, 2) == "0,";) ++samples;
  return samples;
}

class CsvReader : public TraceReader {
 public:
  explicit CsvReader(const std::filesystem::path& path) : lines_(path), info_(read_head(lines_)) {
    bits_ = info_.bits.value_or(15);
    has_row_ = read_row();
    if (!has_row_) throw InputError(lines_.name(), "has no samples; expected lines after its header");
    if (row_.trace != 0 || row_.sample != 0) {
      throw InputError(lines_.place(),
                       fmt::format("starts with trace {}, sample {}, expected 0, 0", row_.trace, row_.sample));
    }
    info_.samples = std::max<std::size_t>(1, count_samples_of_first_trace(path));
  }

  [[nodiscard]] const TraceFileInfo& info() const override { return info_; }

  void expect_bits(std::int32_t bits) override {
    CISTERN_ASSERT(bits >= 4 && bits <= 15);
    if (info_.bits) return;
    bits_ = bits;
    for (std::size_t c = 0; c < info_.channels; ++c) {  // the first row was read before
      if (row_.codes[c] >= (1 << bits_)) refuse_csv_code(lines_.place(), c, row_.codes[c], bits_);
    }
  }

  [[nodiscard]] bool next(std::size_t max_samples, TraceBlock& block) override {
    CISTERN_ASSERT(max_samples >= 1);
    if (!has_row_) return false;
    const std::int64_t trace = row_.trace;
    const std::int64_t first = row_.sample;
    const std::size_t left = info_.samples - static_cast<std::size_t>(first);
    codes_.resize(info_.channels, std::min({max_samples, left, largest_block_codes / info_.channels}));
    for (std::size_t s = 0; s < codes_.samples(); ++s) {
      for (std::size_t c = 0; c < info_.channels; ++c) codes_.channel(c)[s] = row_.codes[c];
      advance();
    }
    block = {trace, first, !has_row_ || row_.trace != trace, {}, codes_.view()};
    return true;
  }

 private:
  bool read_row() {
    std::string_view line;
    if (!lines_.next(line)) return false;
    if (!parse_csv_row(line, info_.channels, bits_, row_)) {
      refuse_csv_row(lines_.place(), line, info_.channels, bits_);
    }
    return true;
  }

  /// Reads the next row and checks that it follows the last one.
  void advance() {
    const std::int64_t trace = row_.trace;
    const std::int64_t next_sample = row_.sample + 1;
    has_row_ = read_row();
    if (has_row_ && row_.trace == trace && row_.sample == next_sample) {
      if (next_sample < static_cast<std::int64_t>(info_.samples)) return;
      throw InputError(lines_.place(), fmt::format("trace {} goes on, expected {} samples as in the first trace", trace,
                                                   info_.samples));
    }
    check_change_of_trace(trace, next_sample);
  }

  void check_change_of_trace(std::int64_t trace, std::int64_t samples) const {
    if (has_row_ && row_.trace == trace) {
      throw InputError(lines_.place(), fmt::format("sample is {}, expected {}", row_.sample, samples));
    }
    if (has_row_ && row_.trace != trace + 1) {
      throw InputError(lines_.place(), fmt::format("trace is {}, expected {} or {}", row_.trace, trace, trace + 1));
    }
    if (samples != static_cast<std::int64_t>(info_.samples)) {
      throw InputError(lines_.place(), fmt::format("trace {} has {} samples, expected {} as in the first trace", trace,
                                                   samples, info_.samples));
    }
    if (has_row_ && row_.sample != 0) {
      throw InputError(lines_.place(), fmt::format("sample is {}, expected 0 for a new trace", row_.sample));
    }
  }

  CsvLines lines_;
  TraceFileInfo info_;
  std::int32_t bits_{15};
  CsvRow row_;
  bool has_row_{false};
  Codes codes_;
};

}  // namespace

std::unique_ptr<TraceReader> open_csv(const std::filesystem::path& path) { return std::make_unique<CsvReader>(path); }

}  // namespace cistern
