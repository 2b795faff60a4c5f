#include "bench/scenario/key_builders.hpp"
#include "bench/scenario/tables.hpp"

namespace cistern {

Table rate_table() {
  using R = RateConfig;
  Table table = single_table<R>(
      "rate", "The scan of levels that `rate` (and the report of `qualify`) shows.",
      {number_key<R>("live_time_s", "s", from_config, {0.001, 1e7}, "Live time of background.", &R::live_time_s),
       number_key<R>("quick_live_time_s", "s", from_config, {0.001, 1e7}, "The same with --quick.",
                     &R::quick_live_time_s),
       number_key<R>("block_s", "s", from_config, {0.0001, 1000},
                     "Firings are counted in blocks of this length, at most the live times.", &R::block_s),
       rising_key<R>("level_factors", "", from_config, {0, 100, true}, "Factors on each trigger's level or sum.",
                     &R::level_factors),
       rising_integers_key<R>("min_samples_over", "samples", "none", {1, 65536},
                              "Scan of the samples over of time_over_threshold triggers; those beyond a trigger's "
                              "window are left out.",
                              &R::min_samples_over),
       number_key<R>("target_rate_hz", "Hz", "none", {0, 1e9, true},
                     "`rate` tells at which level each trigger reaches it.", &R::target_rate_hz)},
      [](Scenario& scenario) -> R& { return scenario.rate; });
  table.check = [](const TableView& at, Scenario& scenario) {
    check_blocks(at, scenario.rate.block_s, scenario.rate.live_time_s, scenario.rate.quick_live_time_s);
  };
  return table;
}

}  // namespace cistern
