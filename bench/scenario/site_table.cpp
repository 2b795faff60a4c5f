#include "bench/scenario/key_builders.hpp"
#include "bench/scenario/tables.hpp"

namespace cistern {

Table site_table() {
  Table table = single_table<SiteConfig>(
      "site", "Where the station stands.",
      {text_key<SiteConfig>("name", "none", "The site's name, for reports.", &SiteConfig::name),
       number_key<SiteConfig>("latitude_deg", "deg", from_config, {-90, 90}, "North is positive; for reports.",
                              &SiteConfig::latitude_deg),
       number_key<SiteConfig>("altitude_m", "m", from_config, {0, 2500}, "Above sea level; raises the muon flux.",
                              &SiteConfig::altitude_m)},
      [](Scenario& scenario) -> SiteConfig& { return scenario.site; });
  table.check = [](const TableView&, Scenario& scenario) {
    scenario.generator.muons.altitude_m = scenario.site.altitude_m;
  };
  return table;
}

}  // namespace cistern
