#pragma once
/// \file
/// Scenario files for tests: written to a folder of their own, loaded, and gone afterwards.
#include <gtest/gtest.h>
#include <unistd.h>

#include <filesystem>
#include <fstream>
#include <string>
#include <string_view>
#include <vector>

#include "bench/scenario/scenario.hpp"
#include "traces/base/errors.hpp"

namespace cistern {

/// The smallest scenario of the manual. Its lines are counted in the tables of faults.
inline constexpr std::string_view smallest_scenario =
    "[digitizer]\n"                     // 1
    "channels = 4\n"                    // 2
    "sample_rate_mhz = 100\n"           // 3
    "bits = 12\n"                       // 4
    "baseline_counts = 200\n"           // 5
    "[[trigger]]\n"                     // 6
    "name = \"long\"\n"                 // 7
    "kind = \"time_over_threshold\"\n"  // 8
    "level_counts = 64\n"               // 9
    "window_samples = 150\n"            // 10
    "min_samples_over = 21\n";          // 11

class ScenarioFile {
 public:
  explicit ScenarioFile(std::string_view text) {
    std::string pattern = (std::filesystem::temp_directory_path() / "cistern-scenario-XXXXXX").string();
    if (mkdtemp(pattern.data()) == nullptr) throw SystemFault("no folder for a test");
    folder_ = pattern;
    std::ofstream(path(), std::ios::binary) << text;
  }
  ~ScenarioFile() { std::filesystem::remove_all(folder_); }
  ScenarioFile(const ScenarioFile&) = delete;
  ScenarioFile& operator=(const ScenarioFile&) = delete;

  [[nodiscard]] std::filesystem::path path() const { return folder_ / "s.toml"; }

 private:
  std::filesystem::path folder_;
};

inline Scenario load_text(std::string_view text, const std::vector<Override>& overrides = {}) {
  const ScenarioFile file(text);
  return load_scenario(file.path(), overrides);
}

/// The smallest scenario and more lines, the first of which is line 12.
inline std::string with_lines(std::string_view more) { return std::string(smallest_scenario) + std::string(more); }

/// The smallest scenario with one line written differently.
inline std::string with_line(std::string_view old_line, std::string_view new_line) {
  std::string text(smallest_scenario);
  const auto at = text.find(old_line);
  if (at == std::string::npos) throw SystemFault("the smallest scenario has no such line");
  return text.replace(at, old_line.size(), new_line);
}

/// The message of the InputError; the folder is left out: "s.toml:3: ...". Empty when there is none.
inline std::string fault_in(std::string_view text, const std::vector<Override>& overrides = {}) {
  const ScenarioFile file(text);
  try {
    (void)load_scenario(file.path(), overrides);
  } catch (const InputError& error) {
    std::string what = error.what();
    const std::string folder = file.path().parent_path().string() + "/";
    if (what.rfind(folder, 0) == 0) what.erase(0, folder.size());
    return what;
  }
  return "";
}

}  // namespace cistern
