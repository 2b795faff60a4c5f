#include "bench/scenario/tables.hpp"

namespace cistern {

Table scenario_table() {
  return single_table<ScenarioIdentity>(
      "scenario", "What the scenario is called, and the seed of its random numbers.",
      {{"title", "", "untitled", "text", "The headline of reports.",
        [](auto& identity, const auto& node, const auto& at) { identity.title = read_text(node, at, {}); }},
       {"summary", "", "none", "text", "A sentence or two for readers.",
        [](auto& identity, const auto& node, const auto& at) { identity.summary = read_text(node, at, {}); }},
       integer_key<ScenarioIdentity>("seed", "", "1", {0, 9e18}, "Same seed, same results; --seed wins over it.", &ScenarioIdentity::seed)},
      [](Scenario& scenario) -> ScenarioIdentity& { return scenario.identity; });
}

Table site_table() {
  Table table = single_table<SiteConfig>(
      "site", "Where the station stands.",
      {{"name", "", "none", "text", "The site's name, for reports.",
        [](auto& site, const auto& node, const auto& at) { site.name = read_text(node, at, {}); }},
       number_key<SiteConfig>("latitude_deg", "deg", "0", {-90, 90}, "North is positive; for reports.", &SiteConfig::latitude_deg),
       number_key<SiteConfig>("altitude_m", "m", "880", {0, 2500}, "Above sea level; raises the muon flux.", &SiteConfig::altitude_m)},
      [](Scenario& scenario) -> SiteConfig& { return scenario.site; });
  table.check = [](const KeyPlace&, Scenario& scenario) { scenario.generator.muons.altitude_m = scenario.site.altitude_m; };
  return table;
}

}  // namespace cistern
