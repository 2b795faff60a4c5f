#include "bench/scenario/tables.hpp"

namespace cistern {

const std::vector<Table>& all_tables() {
  static const std::vector<Table> tables{scenario_table(), site_table(),        digitizer_table(), calibration_table(),
                                         tank_table(),     muons_table(),       frontend_table(),  station_table(),
                                         trigger_table(),  signal_table(),      qualify_table(),   rate_table(),
                                         traces_table(),   requirements_table()};
  return tables;
}

void check_blocks(const TableView& at, double block_s, double live_time_s, double quick_live_time_s) {
  const auto check = [&](const char* key, double value_s) {
    if (block_s <= value_s) return;
    complain(at.blame({"block_s", key}),
             fmt::format("got {}, expected at most {}, which is {} (s)", block_s, key, value_s));
  };
  check("live_time_s", live_time_s);
  check("quick_live_time_s", quick_live_time_s);
}

}  // namespace cistern
