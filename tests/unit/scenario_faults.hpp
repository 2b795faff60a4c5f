#pragma once
/// \file
/// Tables of malformed scenarios: each is refused in one line that names file, line, key and expectation.
#include "tests/unit/scenario_text.hpp"

namespace cistern {

struct FaultRow {
  const char* name;
  std::string text;
  std::string begins;                 ///< "s.toml:3: "
  std::vector<std::string> mentions;  ///< key, value, expectation
  std::vector<Override> overrides{};
};

inline void expect_faults(const std::vector<FaultRow>& rows) {
  for (const FaultRow& row : rows) {
    const std::string fault = fault_in(row.text, row.overrides);
    EXPECT_EQ(fault.rfind(row.begins, 0), 0U) << row.name << ": " << fault;
    EXPECT_EQ(fault.find('\n'), std::string::npos) << row.name << ": " << fault;
    for (const std::string& word : row.mentions)
      EXPECT_NE(fault.find(word), std::string::npos) << row.name << " lacks \"" << word << "\": " << fault;
  }
}

inline std::string with_tank(std::string_view key) { return with_lines("[tank]\n" + std::string(key) + "\n"); }
inline std::string with_calibration(std::string_view lines) {
  return with_lines("[calibration]\n" + std::string(lines) + "\n");
}
inline std::string with_second_trigger(std::string_view lines) {
  return with_lines("[[trigger]]\nname = \"b\"\n" + std::string(lines) + "\n");
}

}  // namespace cistern
