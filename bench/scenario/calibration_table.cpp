#include "bench/scenario/key_builders.hpp"
#include "bench/scenario/tables.hpp"

namespace cistern {

Table calibration_table() {
  using C = CalibrationConfig;
  Table table = single_table<C>(
      "calibration", "Counts of one vertical equivalent muon, as `cistern traces calibrate` prints them.",
      {channel_numbers_key<C>("height_counts_per_vem", "counts", "none", {0, 1e9, true}, "Pulse height, for level_vem.",
                              &C::height_counts_per_vem),
       channel_numbers_key<C>("area_counts_per_vem", "counts x samples", "none", {0, 1e12, true},
                              "Pulse area, for sum_vem.", &C::area_counts_per_vem)},
      [](Scenario& scenario) -> C& { return scenario.calibration; });
  table.check = [](const TableView& at, Scenario& scenario) {
    const auto spread = [&](const char* key, std::optional<std::vector<double>>& values) {
      if (!values) return;
      expect_per_channel(at.at(key), *values, scenario.digitizer.channels);
      values = spread_over_channels(*values, scenario.digitizer.channels);
    };
    spread("height_counts_per_vem", scenario.calibration.height_counts_per_vem);
    spread("area_counts_per_vem", scenario.calibration.area_counts_per_vem);
  };
  return table;
}

}  // namespace cistern
