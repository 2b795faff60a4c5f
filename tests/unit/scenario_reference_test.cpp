/// \file
/// The lists of keys as documentation: complete, explained, and the same as docs/scenario-reference.md.
/// Run this program with CISTERN_UPDATE_REFERENCE=1 to accept a change into the file.
#include <cstdlib>
#include <sstream>

#include "tests/unit/scenario_text.hpp"

namespace cistern {
namespace {

/// The cells of every key's row, with the table's heading in front: heading, key, unit, default, accepted, meaning.
std::vector<std::vector<std::string>> rows_of_reference() {
  std::vector<std::vector<std::string>> rows;
  std::istringstream lines(scenario_reference());
  std::string heading;
  for (std::string line; std::getline(lines, line);) {
    if (line.rfind("## `", 0) == 0) heading = line.substr(4, line.size() - 5);
    if (line.rfind("| `", 0) != 0) continue;
    std::vector<std::string> cells{heading};
    std::istringstream row(line.substr(2));
    for (std::string cell; std::getline(row, cell, '|');) {
      const auto first = cell.find_first_not_of(" `");
      const auto last = cell.find_last_not_of(" `");
      cells.push_back(first == std::string::npos ? "" : cell.substr(first, last - first + 1));
    }
    rows.push_back(cells);
  }
  return rows;
}

/// "[[trigger]]" and "[requirements.NAME]" to "trigger" and "requirements".
std::string table_of(const std::string& heading) {
  const auto first = heading.find_first_not_of('[');
  return heading.substr(first, heading.find_first_of(".]") - first);
}

std::string reference_path() { return std::string(CISTERN_SOURCE_DIR) + "/docs/scenario-reference.md"; }

TEST(ScenarioReference, has_every_key_with_default_range_and_sentence) {
  const auto rows = rows_of_reference();
  EXPECT_GT(rows.size(), 75U);
  for (const auto& cells : rows) {
    ASSERT_EQ(cells.size(), 6U) << cells[1];
    EXPECT_FALSE(cells[3].empty()) << cells[1] << " has no default";
    EXPECT_FALSE(cells[4].empty()) << cells[1] << " has no range";
    EXPECT_TRUE(cells[5].size() > 10 && cells[5].back() == '.') << cells[1] << " has no sentence: " << cells[5];
  }
}

TEST(ScenarioReference, gives_the_unit_that_a_name_ends_with) {
  const std::pair<const char*, const char*> units[] = {
      {"_mhz", "MHz"},         {"_ns", "ns"},   {"_us", "us"}, {"_mv", "mV"}, {"_vem", "VEM"},
      {"_samples", "samples"}, {"_deg", "deg"}, {"_hz", "Hz"}, {"_s", "s"},   {"_m", "m"}};
  for (const auto& cells : rows_of_reference()) {
    for (const auto& [ending, unit] : units) {
      const std::string& key = cells[1];
      const bool ends = key.size() > std::string(ending).size() &&
                        key.compare(key.size() - std::string(ending).size(), std::string::npos, ending) == 0;
      if (!ends || key.find("_per_") != std::string::npos) continue;
      EXPECT_EQ(cells[2], unit) << key;
    }
  }
}

TEST(ScenarioReference, is_what_explain_says_of_every_key) {
  for (const auto& cells : rows_of_reference()) {
    const std::string key = table_of(cells[0]) + "." + cells[1];
    const std::string text = explain_keys(key);
    EXPECT_EQ(text.rfind(key + "\n", 0), 0U) << key;
    for (const std::size_t column : {3U, 4U, 5U}) EXPECT_NE(text.find(cells[column]), std::string::npos) << key;
    EXPECT_NE(explain_keys(table_of(cells[0])).find(cells[1]), std::string::npos) << key;
    EXPECT_NE(explain_keys("").find(cells[1]), std::string::npos) << key;
  }
}

TEST(ScenarioReference, tells_the_defaults_of_the_configs) {
  const std::string text = explain_keys("tank.radius_m");
  EXPECT_NE(text.find(std::to_string(TankConfig{}.radius_m).substr(0, 4)), std::string::npos) << text;
  EXPECT_NE(explain_keys("trigger.rearm").find("default: edge"), std::string::npos);
  EXPECT_NE(explain_keys("station.overlap").find("default: ignore"), std::string::npos);
}

TEST(Explain, takes_a_key_with_the_name_of_an_entry_and_a_key_alone) {
  EXPECT_EQ(explain_keys("trigger.long.majority"), explain_keys("trigger.majority"));
  EXPECT_EQ(explain_keys("majority"), explain_keys("trigger.majority"));
  EXPECT_NE(explain_keys("live_time_s").find("rate.live_time_s"), std::string::npos);
  EXPECT_NE(explain_keys("live_time_s").find("qualify.live_time_s"), std::string::npos);
}

TEST(Explain, names_the_nearest_key_when_there_is_none) {
  const auto fault = [](const char* key) {
    try {
      (void)explain_keys(key);
    } catch (const InputError& error) {
      return std::string(error.what());
    }
    return std::string();
  };
  EXPECT_EQ(fault("trigger.levle_counts"),
            "cistern explain: unknown key `trigger.levle_counts`; nearest: trigger.level_counts");
  EXPECT_EQ(fault("levle_counts"), "cistern explain: unknown key `levle_counts`; nearest: level_counts");
  EXPECT_EQ(fault("triger"), "cistern explain: unknown key `triger`; nearest: trigger");
}

TEST(ScenarioReference, is_the_page_in_docs) {
  if (std::getenv("CISTERN_UPDATE_REFERENCE") != nullptr)
    std::ofstream(reference_path(), std::ios::binary) << scenario_reference();
  std::ifstream stream(reference_path(), std::ios::binary);
  std::ostringstream page;
  page << stream.rdbuf();
  EXPECT_EQ(page.str(), scenario_reference()) << "run this test with CISTERN_UPDATE_REFERENCE=1 to accept the change";
}

/// The page's own example, and every demo, must load.
TEST(ScenarioReference, shows_a_smallest_scenario_that_loads) {
  const std::string page = scenario_reference();
  const auto first = page.find("```toml\n") + 8;
  EXPECT_EQ(fault_in(page.substr(first, page.find("```", first) - first)), "");
}

TEST(DemoScenarios, load) {
  for (const auto& entry : std::filesystem::directory_iterator(std::string(CISTERN_SOURCE_DIR) + "/bench/scenarios")) {
    if (entry.path().extension() != ".toml") continue;
    EXPECT_NO_THROW((void)load_scenario(entry.path(), {})) << entry.path();
  }
}

}  // namespace
}  // namespace cistern
