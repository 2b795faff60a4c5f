#pragma once
/// \file
/// Recorded traces in CSV, NPY (format 1.0) and HDF5: one interface, streamed block by block, so
/// that a file of any size, of many traces or of one very long one, needs little memory.
/// Errors: InputError naming file, place and expectation; SystemFault when the disk fails.
#include <cstdint>
#include <filesystem>
#include <memory>
#include <optional>
#include <string>
#include <vector>

#include "traces/base/time.hpp"
#include "traces/waveform/codes.hpp"

namespace cistern {

enum class TraceFormat { Csv, Npy, Hdf5 };

/// By extension: .csv, .npy, .h5 or .hdf5 (any case). InputError otherwise.
[[nodiscard]] TraceFormat format_of(const std::filesystem::path& path);

/// What a file says about its traces; absent where it says nothing.
struct TraceFileInfo {
  std::size_t channels{0};
  std::size_t samples{0};              ///< per trace; CSV: of the first trace
  std::optional<std::int64_t> traces;  ///< unknown until the end for CSV
  std::optional<double> sample_rate_mhz;
  std::optional<std::int32_t> bits;
  std::optional<std::vector<std::int32_t>> baseline_counts;  ///< one per channel
  std::optional<std::vector<double>> height_counts_per_vem;  ///< one per channel
  std::optional<std::vector<double>> area_counts_per_vem;    ///< one per channel
  std::optional<std::string> selection;                      ///< "unbiased" or "triggered_by:NAME"
  std::optional<double> live_time_s;
  bool contiguous{false};  ///< each trace goes on where the last ended
};

/// A stretch of one trace, all channels. Valid until the next call of `next`.
struct TraceBlock {
  std::int64_t trace{0};
  std::int64_t first_sample{0};  ///< of the block, within its trace
  bool last_of_trace{false};
  std::optional<GpsNanoseconds> start_ns;  ///< of the trace's sample 0
  CodesView codes;
};

/// Reads traces in order. Every code is checked against 0 .. 2^bits - 1 (`bits` of the file, or the
/// bits given to `expect_bits`, or 15).
class TraceReader {
 public:
  virtual ~TraceReader() = default;
  [[nodiscard]] virtual const TraceFileInfo& info() const = 0;
  /// Bits to check codes against where the file says none. Call before the first `next`.
  virtual void expect_bits(std::int32_t bits) = 0;
  /// The next samples of the current trace: at least one, at most `max_samples` (>= 1), and no more than
  /// fit into a few megabytes. False at the end of the file.
  [[nodiscard]] virtual bool next(std::size_t max_samples, TraceBlock& block) = 0;
};

[[nodiscard]] std::unique_ptr<TraceReader> open_trace_file(const std::filesystem::path& path);

/// One column of truth beside the codes (HDF5 only), one number per trace.
struct TruthColumn {
  std::string name;
  std::string unit;
  std::vector<double> values;
};

/// The truth columns of an HDF5 file; empty when it has none.
[[nodiscard]] std::vector<TruthColumn> read_truth(const std::filesystem::path& path);

/// Writes traces; the file appears under its name only at `finish`, whole, or not at all.
class TraceWriter {
 public:
  virtual ~TraceWriter() = default;
  /// Appends a block to the current trace (its samples follow those of the block before);
  /// `last_of_trace` closes the trace. All traces must have `info.samples` samples.
  virtual void append(const TraceBlock& block) = 0;
  /// \param truth  empty, or one value per trace in each column; InputError unless HDF5
  virtual void finish(const std::vector<TruthColumn>& truth) = 0;
};

/// \param info  `channels`, `samples` and, for NPY, `traces` must be set.
[[nodiscard]] std::unique_ptr<TraceWriter> create_trace_file(const std::filesystem::path& path,
                                                             const TraceFileInfo& info);

}  // namespace cistern
