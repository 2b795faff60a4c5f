#include "bench/scenario/tables.hpp"

namespace cistern {

Table scenario_table() {
  return single_table<ScenarioIdentity>(
      "scenario", "What the scenario is called, and the seed of its random numbers.",
      {{"title", "", "untitled", "text", "The headline of reports.",
        [](auto& identity, const auto& node, const auto& at) { identity.title = read_text(node, at, {}); }},
       {"summary", "", "none", "text", "A sentence or two for readers.",
        [](auto& identity, const auto& node, const auto& at) { identity.summary = read_text(node, at, {}); }},
       integer_key<ScenarioIdentity>("seed", "", "1", {0, 9e18}, "Same seed, same results; --seed wins over it.",
                                     &ScenarioIdentity::seed)},
      [](Scenario& scenario) -> ScenarioIdentity& { return scenario.identity; });
}

}  // namespace cistern
