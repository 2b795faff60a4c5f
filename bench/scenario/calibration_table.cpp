#include "bench/scenario/tables.hpp"

namespace cistern {

Table calibration_table() {
  using C = CalibrationConfig;
  Table table = single_table<C>("calibration",
                                "Counts of one vertical equivalent muon, as `cistern traces calibrate` prints them.",
                                {{"height_counts_per_vem", "counts", "none", "more than 0; one, or one per channel",
                                  "Pulse height, for level_vem.",
                                  [](C& c, const auto& node, const auto& at) {
                                    c.height_counts_per_vem = read_numbers(node, at, {0, 1e9, true});
                                  }},
                                 {"area_counts_per_vem", "counts x samples", "none",
                                  "more than 0; one, or one per channel", "Pulse area, for sum_vem.",
                                  [](C& c, const auto& node, const auto& at) {
                                    c.area_counts_per_vem = read_numbers(node, at, {0, 1e12, true});
                                  }}},
                                [](Scenario& scenario) -> C& { return scenario.calibration; });
  table.check = [](const KeyPlace& at, Scenario& scenario) {
    for (auto* list : {&scenario.calibration.height_counts_per_vem, &scenario.calibration.area_counts_per_vem}) {
      if (!*list) continue;
      const bool is_height = list == &scenario.calibration.height_counts_per_vem;
      expect_per_channel({at.place, at.key + (is_height ? ".height_counts_per_vem" : ".area_counts_per_vem")}, **list,
                         scenario.digitizer.channels);
      *list = spread_over_channels(**list, scenario.digitizer.channels);
    }
  };
  return table;
}

}  // namespace cistern
