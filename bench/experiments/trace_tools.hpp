#pragma once
/// \file
/// `cistern traces`: making, converting, describing trace files, and the calibration of a scenario.
#include <cstdint>
#include <filesystem>
#include <functional>
#include <optional>
#include <string>
#include <vector>

#include "bench/scenario/scenario.hpp"
#include "traces/files/trace_file.hpp"

namespace cistern {

using TraceProgress = std::function<void(std::int64_t done, std::int64_t total)>;

struct MakeRequest {
  std::filesystem::path out;
  std::optional<SignalKind> signal;  ///< nothing: background, one stretch after the other
  double size_vem{1};
  double spread_ns{0};
  std::int64_t traces{100};
  std::int64_t samples{2048};                ///< per trace
  std::optional<std::int64_t> onset_sample;  ///< of the signal; a quarter of the trace if not given
  std::optional<GpsNanoseconds> start_ns;    ///< of the first trace (HDF5 only)
  std::uint64_t seed{1};
};
/// Writes digitized synthetic traces with everything the file format can say about them.
void make_traces(const Scenario& scenario, const MakeRequest& request, const TraceProgress& progress);

/// Facts for a file that does not say them itself; a contradiction is an InputError.
struct ConvertRequest {
  std::filesystem::path in;
  std::filesystem::path out;
  TraceFileInfo said;  ///< what the user adds; unset where nothing
};
void convert_traces(const ConvertRequest& request, const TraceProgress& progress);

/// Lines for people. \param bits  where the file says none
[[nodiscard]] std::vector<std::string> describe_traces(const std::filesystem::path& file,
                                                       const TraceProgress& progress);
[[nodiscard]] std::string describe_traces_json(const std::filesystem::path& file, const TraceProgress& progress);

/// Counts per VEM from simulated vertical muons, as the [calibration] table to put into a scenario.
[[nodiscard]] std::vector<std::string> calibration_lines(const Scenario& scenario, int muons, std::uint64_t seed);

}  // namespace cistern
