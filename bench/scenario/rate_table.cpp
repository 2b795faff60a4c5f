#include "bench/scenario/tables.hpp"

namespace cistern {

Table rate_table() {
  using R = RateConfig;
  Table table = single_table<R>(
      "rate", "The scan of levels that `rate` (and the report of `qualify`) shows.",
      {number_key<R>("live_time_s", "s", "60", {0.001, 1e7}, "Live time of background.", &R::live_time_s),
       number_key<R>("quick_live_time_s", "s", "6", {0.001, 1e7}, "The same with --quick.", &R::quick_live_time_s),
       number_key<R>("block_s", "s", "0.1", {0.0001, 1000}, "Firings are counted in blocks of this length.",
                     &R::block_s),
       {"level_factors", "", "[0.5, 0.6, ... 2.0]", "rising, more than 0 and at most 100",
        "Factors on each trigger's level or sum.",
        [](R& r, const auto& node, const auto& at) {
          r.level_factors = read_rising(node, at, {0, 100, true});
        }},
       {"min_samples_over", "samples", "none", "whole, rising, from 1 to 65536",
        "Scan of the samples over of time_over_threshold triggers.",
        [](R& r, const auto& node, const auto& at) {
          r.min_samples_over.clear();
          for (const double value : read_rising(node, at, {1, 65536})) {
            if (value != static_cast<std::int32_t>(value)) reject(at, node, "whole numbers");
            r.min_samples_over.push_back(static_cast<std::int32_t>(value));
          }
        }},
       {"target_rate_hz", "Hz", "none", "more than 0", "`rate` tells at which level each trigger reaches it.",
        [](R& r, const auto& node, const auto& at) {
          r.target_rate_hz = read_number(node, at, {0, 1e9, true});
        }}},
      [](Scenario& scenario) -> R& { return scenario.rate; });
  table.check = [](const KeyPlace& at, Scenario& scenario) {
    check_blocks(at, scenario.rate.block_s, scenario.rate.live_time_s, scenario.rate.quick_live_time_s);
  };
  return table;
}

}  // namespace cistern
