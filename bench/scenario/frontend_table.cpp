#include "bench/scenario/key_builders.hpp"
#include "bench/scenario/tables.hpp"

namespace cistern {
namespace {

/// Shaped pulse height in mV and input range in mV stay in the units of their tables; the front
/// end's counts_per_mv follows from the digitizer.
std::vector<Key<FrontendConfig>> frontend_keys() {
  using F = FrontendConfig;
  return {number_key<F>("pulse_height_mv", "mV", from_config, {0, 1000, true},
                        "Peak of a mean single photo-electron after shaping.", &F::pulse_height_mv),
          number_key<F>("shaping_time_ns", "ns", from_config, {1, 1000},
                        "Time constant tau of the pulse (t/tau)^2 e^(-t/tau).", &F::shaping_time_ns),
          number_key<F>("transit_time_spread_ns", "ns", from_config, {0, 100},
                        "Gaussian rms of a photo-electron's transit time.", &F::transit_time_spread_ns),
          number_key<F>("charge_spread", "", from_config, {0, 1}, "Relative rms of the single-photo-electron charge.",
                        &F::charge_spread),
          number_key<F>("noise_rms_mv", "mV", from_config, {0, 1000}, "Electronic noise after shaping, rms.",
                        &F::noise_rms_mv),
          number_key<F>("noise_correlation", "", from_config, {0, 0.95},
                        "Correlation of the noise of adjacent samples.", &F::noise_correlation)};
}

}  // namespace

Table frontend_table() {
  return single_table<FrontendConfig>(
      "frontend", "From photo-electrons to the waveform at the digitizer.", frontend_keys(),
      [](Scenario& scenario) -> FrontendConfig& { return scenario.generator.frontend; });
}

}  // namespace cistern
