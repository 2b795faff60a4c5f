#include "bench/scenario/key_builders.hpp"
#include "bench/scenario/tables.hpp"

namespace cistern {

Table muons_table() {
  using M = MuonConfig;
  return single_table<M>(
      "muons", "The atmospheric muons of the background.",
      {number_key<M>("momentum_min_gev", "GeV/c", from_config, {0.15, 100}, "Muons below it are left out.",
                     &M::momentum_min_gev),
       number_key<M>("flux_scale", "", from_config, {0, 1000, true}, "Factor on the published flux.", &M::flux_scale)},
      [](Scenario& scenario) -> M& { return scenario.generator.muons; });
}

}  // namespace cistern
