#include "bench/scenario/key_builders.hpp"
#include "bench/scenario/tables.hpp"

namespace cistern {

Table scenario_table() {
  return single_table<ScenarioIdentity>(
      "scenario", "What the scenario is called, and the seed of its random numbers.",
      {text_key<ScenarioIdentity>("title", from_config, "The headline of reports.", &ScenarioIdentity::title),
       text_key<ScenarioIdentity>("summary", "none", "A sentence or two for readers.", &ScenarioIdentity::summary),
       integer_key<ScenarioIdentity>("seed", "", from_config, {0}, "Same seed, same results; --seed wins over it.",
                                     &ScenarioIdentity::seed)},
      [](Scenario& scenario) -> ScenarioIdentity& { return scenario.identity; });
}

}  // namespace cistern
