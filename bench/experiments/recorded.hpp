#pragma once
/// \file
/// The triggers run over a file of recorded traces.
#include <cstdint>
#include <functional>
#include <optional>
#include <string>
#include <vector>

#include "bench/experiments/station_plan.hpp"
#include "firmware_model/trigger/firing.hpp"
#include "firmware_model/trigger/margin.hpp"
#include "traces/files/trace_file.hpp"

namespace cistern {

/// What file and scenario together say of the recorded traces.
struct RecordedFacts {
  StationFacts station;
  std::string selection;  ///< "unbiased", "triggered_by:NAME" or "" (nobody says)
  std::optional<double> live_time_s;
  bool contiguous{false};
  std::vector<std::string> notes;  ///< differences where the scenario won, one sentence each
};

/// Channels, bits and rate must agree; baseline and calibration of the scenario win, a difference is
/// noted; `triggered_by` of the file stays. InputError naming the file otherwise.
/// \param file  for messages
[[nodiscard]] RecordedFacts reconcile(const Scenario& scenario, const TraceFileInfo& info, const std::string& file);

/// One trace as the triggers saw it.
struct RecordedTrace {
  std::int64_t trace{0};
  std::optional<GpsNanoseconds> start_ns;
  std::int64_t samples{0};
  std::vector<std::optional<MarginMeter::Best>> margins;  ///< per trigger; samples within the trace
};

struct RecordedSink {
  /// Firings in order of (sample, trigger); samples count within the trace.
  std::function<void(std::int64_t trace, std::optional<GpsNanoseconds> start_ns, std::size_t trigger,
                     const Firing& firing)>
      firing;
  std::function<void(const RecordedTrace& trace)> end_of_trace;
  /// Asked after every block; true ends the scan early (the user wants to stop).
  std::function<bool()> stop;
};

/// \return false when it was stopped early
bool scan_recorded(TraceReader& reader, const std::vector<TriggerSettings>& triggers, bool contiguous,
                   const RecordedSink& sink);

}  // namespace cistern
