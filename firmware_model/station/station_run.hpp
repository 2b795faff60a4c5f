#pragma once
/// \file
/// Runs one clocked station over a stretch of samples, from the digitizer to the capture buffers. The SystemC model
/// behind it stays hidden; callers need no kernel header. Pipeline, clock by clock: docs/station.md.
#include <cstdint>
#include <optional>
#include <string>
#include <vector>

#include "firmware_model/digitizer/digitizer.hpp"
#include "firmware_model/station/capture_book.hpp"
#include "firmware_model/station/capture_unit.hpp"
#include "firmware_model/trigger/firing.hpp"
#include "firmware_model/trigger/settings.hpp"
#include "traces/base/time.hpp"
#include "traces/waveform/codes.hpp"
#include "traces/waveform/waveform.hpp"

namespace cistern {

struct StationConfig {
  DigitizerConfig digitizer;
  CaptureConfig capture;
  std::int64_t ring_samples{1024};  ///< length of the ring buffer, > capture.pre_samples (the default is invented)
  GpsNanoseconds start_ns{0};       ///< sampling instant of sample 0
};

/// A firing of one trigger and what the station made of it.
struct StationFiring {
  std::size_t trigger{0};                 ///< place in the list of triggers
  Firing firing;                          ///< status Busy: passed by the trigger, lost for want of a buffer
  GpsNanoseconds time_ns{0};              ///< sampling instant of the firing's sample
  GpsNanoseconds decided_ns{0};           ///< clock at which the capture buffers heard of it
  std::optional<CaptureOutcome> outcome;  ///< empty when the trigger did not pass it
  std::optional<std::size_t> capture;     ///< place in StationRun::captures of the one that holds it
};

struct StationRun {
  std::vector<StationFiring> firings;    ///< by sample, then trigger
  std::vector<StationCapture> captures;  ///< in order of firing
  std::int64_t samples{0};
  std::int64_t busy_samples{0};  ///< samples at which every buffer was taken
};

/// Clocks from the sampling instant to the capture buffers: the digitizer's pipeline, its output register, the
/// trigger's output register.
[[nodiscard]] constexpr std::int64_t decision_clocks(const DigitizerConfig& digitizer) {
  return digitizer.latency_samples + 2;
}

/// Runs recorded codes, starting from reset. The station fires when any of `triggers` does.
/// InputError for a configuration out of range, a code outside the digitizer's range, or a run of more than
/// 100 days. One run per process (the kernel cannot start again): a second one is a bug of the caller.
[[nodiscard]] StationRun run_station(const StationConfig& config, const std::vector<TriggerSettings>& triggers,
                                     CodesView codes);

/// The same for a waveform, which goes through the digitizer.
[[nodiscard]] StationRun run_station(const StationConfig& config, const std::vector<TriggerSettings>& triggers,
                                     const Waveform& waveform);

}  // namespace cistern
