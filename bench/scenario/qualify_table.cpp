#include "bench/scenario/key_builders.hpp"
#include "bench/scenario/tables.hpp"

namespace cistern {

Table qualify_table() {
  using Q = QualifyConfig;
  Table table = single_table<Q>(
      "qualify", "How much `qualify` measures.",
      {integer_key<Q>("signals_per_point", "", from_config, {1, 10'000'000}, "Test signals for each size and spread.",
                      &Q::signals_per_point),
       integer_key<Q>("quick_signals_per_point", "", from_config, {1, 10'000'000}, "The same with --quick.",
                      &Q::quick_signals_per_point),
       number_key<Q>("live_time_s", "s", from_config, {0.001, 1e7}, "Live time of background.", &Q::live_time_s),
       number_key<Q>("quick_live_time_s", "s", from_config, {0.001, 1e7}, "The same with --quick.",
                     &Q::quick_live_time_s),
       number_key<Q>("block_s", "s", from_config, {0.0001, 1000},
                     "Firings are counted in blocks of this length, at most the live times.", &Q::block_s),
       number_key<Q>("match_window_ns", "ns", from_config, {1, 1e6},
                     "A first firing within it after the onset belongs to the signal.", &Q::match_window_ns),
       number_key<Q>("spare_before_ns", "ns", from_config, {0, 1e6},
                     "Noise before a test signal; at least the longest window is kept anyway.", &Q::spare_before_ns)},
      [](Scenario& scenario) -> Q& { return scenario.qualify; });
  table.check = [](const TableView& at, Scenario& scenario) {
    check_blocks(at, scenario.qualify.block_s, scenario.qualify.live_time_s, scenario.qualify.quick_live_time_s);
  };
  return table;
}

}  // namespace cistern
