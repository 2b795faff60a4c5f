#include "bench/scenario/tables.hpp"

#include <algorithm>

namespace cistern {

const std::vector<Table>& all_tables() {
  static const std::vector<Table> tables{scenario_table(), site_table(),        digitizer_table(), calibration_table(),
                                         tank_table(),     muons_table(),       frontend_table(),  station_table(),
                                         trigger_table(),  signal_table(),      qualify_table(),   rate_table(),
                                         traces_table(),   requirements_table()};
  return tables;
}

void check_blocks(const KeyPlace& at, double block_s, double live_s, double quick_s) {
  const double shortest = std::min(live_s, quick_s);
  if (block_s > shortest)
    complain({at.place, at.key + ".block_s"},
             fmt::format("got {}, expected at most the live times ({})", block_s, shortest));
}

}  // namespace cistern
