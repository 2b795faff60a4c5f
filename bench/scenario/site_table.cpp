#include "bench/scenario/tables.hpp"

namespace cistern {

Table site_table() {
  Table table = single_table<SiteConfig>(
      "site", "Where the station stands.",
      {{"name", "", "none", "text", "The site's name, for reports.",
        [](auto& site, const auto& node, const auto& at) { site.name = read_text(node, at, {}); }},
       number_key<SiteConfig>("latitude_deg", "deg", "0", {-90, 90}, "North is positive; for reports.",
                              &SiteConfig::latitude_deg),
       number_key<SiteConfig>("altitude_m", "m", "880", {0, 2500}, "Above sea level; raises the muon flux.",
                              &SiteConfig::altitude_m)},
      [](Scenario& scenario) -> SiteConfig& { return scenario.site; });
  table.check = [](const KeyPlace&, Scenario& scenario) {
    scenario.generator.muons.altitude_m = scenario.site.altitude_m;
  };
  return table;
}

}  // namespace cistern
