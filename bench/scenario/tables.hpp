#pragma once
/// \file
/// The tables of a scenario. Each *_table.cpp holds one: its keys and how they fill the Scenario.
/// Internal to bench/scenario, since it shows toml++.
#include <functional>
#include <string>
#include <vector>

#include "bench/scenario/reading.hpp"
#include "bench/scenario/scenario.hpp"

namespace cistern {

enum class TableShape {
  Single,  ///< [name]
  List,    ///< [[name]], each with a `name` of its own
  Named,   ///< [name.ENTRY]
};

struct Table {
  std::string name;
  TableShape shape{TableShape::Single};
  std::string sentence;
  std::vector<KeyDescription> keys;
  /// Reads the table (for a List or Named one: one entry). \param full_name  "trigger.long"
  std::function<void(const ReadingContext&, const toml::table&, const std::string& full_name, Scenario&)> read;
  /// Checks that need more than one key, whether the scenario has the table or not.
  std::function<void(const TableView&, Scenario&)> check;
};

[[nodiscard]] Table scenario_table();
[[nodiscard]] Table site_table();
[[nodiscard]] Table tank_table();
[[nodiscard]] Table muons_table();
[[nodiscard]] Table frontend_table();
[[nodiscard]] Table digitizer_table();
[[nodiscard]] Table calibration_table();
[[nodiscard]] Table station_table();
[[nodiscard]] Table trigger_table();
[[nodiscard]] Table signal_table();
[[nodiscard]] Table qualify_table();
[[nodiscard]] Table rate_table();
[[nodiscard]] Table traces_table();
[[nodiscard]] Table requirements_table();

/// All of them, in the order in which they are read: a table may rely on those before it.
[[nodiscard]] const std::vector<Table>& all_tables();

/// Complains when the blocks of a live time are longer than the shortest live time.
void check_blocks(const TableView& at, double block_s, double live_time_s, double quick_live_time_s);

/// A Single table whose keys fill `part(scenario)`.
template <typename Target, typename Part>
Table single_table(std::string name, std::string sentence, std::vector<Key<Target>> keys, Part part) {
  Table table;
  table.name = std::move(name);
  table.sentence = std::move(sentence);
  table.keys = describe(keys);
  table.read = [keys = std::move(keys), part](const ReadingContext& context, const toml::table& toml,
                                              const std::string& full_name, Scenario& scenario) {
    read_keys(context, keys, toml, full_name, part(scenario));
  };
  return table;
}

/// Complains unless `values` has one entry or one per channel.
template <typename Value>
void expect_per_channel(const KeyPlace& at, const std::vector<Value>& values, std::int32_t channels) {
  if (values.size() == 1 || values.size() == static_cast<std::size_t>(channels)) return;
  complain(at, fmt::format("got {} values, expected one number or {} (one per channel)", values.size(), channels));
}

/// One value for all channels, or one each, to one each.
template <typename Value>
std::vector<Value> spread_over_channels(const std::vector<Value>& values, std::int32_t channels) {
  return values.size() == 1 ? std::vector<Value>(static_cast<std::size_t>(channels), values.front()) : values;
}

}  // namespace cistern
