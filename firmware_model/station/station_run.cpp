#include "firmware_model/station/station_run.hpp"

#include <exception>
#include <string>
#include <systemc>

#include "firmware_model/station/station_module.hpp"
#include "traces/base/errors.hpp"

namespace cistern {
namespace {

/// The kernel wraps around silently soon after: 2^63 ps are 106 days.
constexpr std::int64_t longest_run_ns = 100LL * 24 * 3600 * 1'000'000'000;

void expect_no_fault(const std::optional<std::string>& fault) {
  if (fault) throw InputError("station", *fault);
}

/// Instant of the last clock edge, at which a firing in the last sample is heard of.
std::int64_t last_edge_ns(const DigitizerConfig& digitizer, std::int64_t samples) {
  const std::int64_t edges = samples + decision_clocks(digitizer);
  // In floating point first: the exact offset of a run that is much too long may not fit 64 bits.
  const double estimate_ns = static_cast<double>(edges) * 1000.0 / digitizer.sample_rate_mhz;
  if (estimate_ns < 2.0 * static_cast<double>(longest_run_ns)) {
    const std::int64_t exact_ns = sample_offset_ns(edges - 1, digitizer.sample_rate_mhz);
    if (exact_ns <= longest_run_ns) return exact_ns;
  }
  throw InputError("station", "a run of at most 100 days expected, this one lasts " +
                                  std::to_string(estimate_ns / (24 * 3600e9)) + " days");
}

void check(const StationConfig& config, const std::vector<TriggerSettings>& triggers, std::size_t channels) {
  const DigitizerConfig& digitizer = config.digitizer;
  expect_no_fault(fault_of(config.capture));
  expect_no_fault(fault_of_ring(config.ring_samples, config.capture));
  // Sampling instants are whole nanoseconds and must differ.
  if (!(digitizer.sample_rate_mhz > 0 && digitizer.sample_rate_mhz <= 1000)) {
    throw InputError("digitizer", "sample_rate_mhz: above 0 and at most 1000 expected");
  }
  if (digitizer.latency_samples < 0) throw InputError("digitizer", "latency_samples: at least 0 expected");
  CISTERN_ASSERT(static_cast<std::size_t>(digitizer.channels) == channels);
  for (const TriggerSettings& settings : triggers) assert_valid(settings, channels);
}

void claim_the_only_run_of_this_process() {
  static bool claimed = false;
  CISTERN_ASSERT(!claimed);
  claimed = true;
}

}  // namespace

StationRun run_station(const StationConfig& config, const std::vector<TriggerSettings>& triggers, CodesView codes) {
  check(config, triggers, codes.channels());
  const std::int64_t end_ns = last_edge_ns(config.digitizer, static_cast<std::int64_t>(codes.samples()));
  claim_the_only_run_of_this_process();
  // Standard output is for results; that a process stopped the simulation shows in failure().
  sc_core::sc_report_handler::set_actions(sc_core::SC_INFO, sc_core::SC_DO_NOTHING);
  StationModule station("station", config, triggers, codes);
  // One tick more than the last edge, so that its processes run.
  sc_core::sc_start(exact_time_ns(end_ns) + sc_core::sc_get_time_resolution());
  if (station.failure()) std::rethrow_exception(station.failure());
  return station.finish();
}

StationRun run_station(const StationConfig& config, const std::vector<TriggerSettings>& triggers,
                       const Waveform& waveform) {
  Codes codes;
  digitize(config.digitizer, waveform, codes);
  return run_station(config, triggers, codes.view());
}

}  // namespace cistern
