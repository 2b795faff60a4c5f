#include "tests/system/run_files.hpp"

#include <gtest/gtest.h>

#include <algorithm>

namespace cistern {

std::vector<std::string> files_of(const ScratchDirectory& directory, const std::string& run) {
  std::vector<std::string> names;
  for (const auto& entry : std::filesystem::directory_iterator(directory.path() / run))
    names.push_back(entry.path().filename().string());
  std::sort(names.begin(), names.end());
  return names;
}

std::string tables_of(const ScratchDirectory& directory, const std::string& run) {
  const ProgramRun dump = run_shell(directory, "sqlite3 '" + run + "/run.sqlite' .dump >dump && LC_ALL=C sort dump");
  EXPECT_EQ(dump.status, 0) << dump.errors;
  return dump.output;
}

void expect_same_run(const ScratchDirectory& directory, const std::string& a, const std::string& b) {
  EXPECT_EQ(files_of(directory, a), files_of(directory, b));
  for (const std::string& name : files_of(directory, a)) {
    if (name == "timing.json" || name == "run.sqlite") continue;
    EXPECT_EQ(directory.read(a + "/" + name), directory.read(b + "/" + name)) << name;
  }
  const std::string tables = tables_of(directory, a);
  EXPECT_NE(tables.find("INSERT INTO figures"), std::string::npos);
  EXPECT_EQ(tables, tables_of(directory, b));
}

}  // namespace cistern
