/// \file
/// [tank], [muons] and [frontend]: what shapes synthetic traces.
#include "bench/scenario/tables.hpp"

namespace cistern {
namespace {

/// Shaped pulse height in mV and input range in mV stay in the units of their tables; the front
/// end's counts_per_mv follows from the digitizer.
std::vector<Key<FrontendConfig>> frontend_keys() {
  using F = FrontendConfig;
  return {number_key<F>("pulse_height_mv", "mV", "1.4", {0, 1000, true}, "Peak of a mean single photo-electron after shaping.", &F::pulse_height_mv),
          number_key<F>("shaping_time_ns", "ns", "12", {1, 1000}, "Time constant tau of the pulse (t/tau)^2 e^(-t/tau).", &F::shaping_time_ns),
          number_key<F>("transit_time_spread_ns", "ns", "2", {0, 100}, "Gaussian rms of a photo-electron's transit time.", &F::transit_time_spread_ns),
          number_key<F>("charge_spread", "", "0.35", {0, 1}, "Relative rms of the single-photo-electron charge.", &F::charge_spread),
          number_key<F>("noise_rms_mv", "mV", "0.7", {0, 1000}, "Electronic noise after shaping, rms.", &F::noise_rms_mv),
          number_key<F>("noise_correlation", "", "0.5", {0, 0.95}, "Correlation of the noise of adjacent samples.", &F::noise_correlation)};
}

}  // namespace

Table tank_table() {
  using T = TankConfig;
  Table table = single_table<T>(
      "tank", "The water, its tubes and its light. With this table synthetic traces can be made; [digitizer] channels is the number of tubes.",
      {number_key<T>("radius_m", "m", "1.35", {0.1, 20}, "Of the cylinder of water.", &T::radius_m),
       number_key<T>("depth_m", "m", "1.6", {0.1, 10}, "Of the water; one VEM is a vertical muon through it.", &T::depth_m),
       number_key<T>("tube_circle_radius_m", "m", "0.75", {0, 20}, "Of the circle on which the tubes sit, evenly; at most radius_m.", &T::tube_circle_radius_m),
       number_key<T>("photo_electrons_per_vem_and_tube", "", "55", {0.1, 10000}, "Mean number that one VEM gives in one tube.", &T::photo_electrons_per_vem_and_tube),
       number_key<T>("wall_reflectivity", "", "0.92", {0.01, 0.995}, "Diffuse reflectivity of the walls; sets the light's decay.", &T::wall_reflectivity),
       number_key<T>("absorption_length_m", "m", "60", {0.1, 1000}, "Of the water, for the light that counts.", &T::absorption_length_m),
       number_key<T>("direct_light_fraction", "", "0.12", {0, 0.9}, "Share of the light that a tube sees before the first reflection.", &T::direct_light_fraction)},
      [](Scenario& scenario) -> T& {
        scenario.has_tank = true;
        return scenario.generator.tank;
      });
  table.check = [](const KeyPlace& at, Scenario& scenario) {
    const T& tank = scenario.generator.tank;
    if (tank.tube_circle_radius_m > tank.radius_m) {
      complain(at, fmt::format("tube_circle_radius_m is {}, expected at most radius_m, which is {}", tank.tube_circle_radius_m, tank.radius_m));
    }
  };
  return table;
}

Table muons_table() {
  using M = MuonConfig;
  return single_table<M>("muons", "The atmospheric muons of the background.",
                         {number_key<M>("momentum_min_gev", "GeV/c", "0.2", {0.15, 100}, "Muons below it are left out.", &M::momentum_min_gev),
                          number_key<M>("flux_scale", "", "1", {0, 1000}, "Factor on the published flux; 0 leaves noise alone.", &M::flux_scale)},
                         [](Scenario& scenario) -> M& { return scenario.generator.muons; });
}

Table frontend_table() {
  return single_table<FrontendConfig>("frontend", "From photo-electrons to the waveform at the digitizer.", frontend_keys(),
                                      [](Scenario& scenario) -> FrontendConfig& { return scenario.generator.frontend; });
}

}  // namespace cistern
