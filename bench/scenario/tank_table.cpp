#include "bench/scenario/key_builders.hpp"
#include "bench/scenario/tables.hpp"

namespace cistern {

Table tank_table() {
  using T = TankConfig;
  Table table = single_table<T>(
      "tank",
      "The water, its tubes and its light. With this table synthetic traces can be made; [digitizer] channels is the "
      "number of tubes.",
      {number_key<T>("radius_m", "m", from_config, {0.1, 20}, "Of the cylinder of water.", &T::radius_m),
       number_key<T>("depth_m", "m", from_config, {0.1, 10}, "Of the water; one VEM is a vertical muon through it.",
                     &T::depth_m),
       number_key<T>("tube_circle_radius_m", "m", from_config, {0, 20},
                     "Of the circle on which the tubes sit, evenly; at most radius_m.", &T::tube_circle_radius_m),
       number_key<T>("photo_electrons_per_vem_and_tube", "", from_config, {0.1, 10000},
                     "Mean number that one VEM gives in one tube.", &T::photo_electrons_per_vem_and_tube),
       number_key<T>("wall_reflectivity", "", from_config, {0.01, 0.995},
                     "Diffuse reflectivity of the walls; sets the light's decay.", &T::wall_reflectivity),
       number_key<T>("absorption_length_m", "m", from_config, {0.1, 1000}, "Of the water, for the light that counts.",
                     &T::absorption_length_m),
       number_key<T>("direct_light_fraction", "", from_config, {0, 1, false, true},
                     "Share of the light that a tube sees before the first reflection.", &T::direct_light_fraction)},
      [](Scenario& scenario) -> T& {
        scenario.has_tank = true;
        return scenario.generator.tank;
      });
  table.check = [](const TableView& at, Scenario& scenario) {
    const T& tank = scenario.generator.tank;
    if (tank.tube_circle_radius_m > tank.radius_m) {
      complain(
          at.blame({"tube_circle_radius_m", "radius_m"}),
          fmt::format("got {}, expected at most radius_m, which is {} (m)", tank.tube_circle_radius_m, tank.radius_m));
    }
  };
  return table;
}

}  // namespace cistern
