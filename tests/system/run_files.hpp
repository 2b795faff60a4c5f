#pragma once
/// \file
/// What a run left behind, for comparing two.
#include <string>
#include <vector>

#include "tests/system/program.hpp"

namespace cistern {

/// Names of the files in a run directory, sorted.
[[nodiscard]] std::vector<std::string> files_of(const ScratchDirectory& directory, const std::string& run);

/// Tables and rows of run.sqlite in the order of their text, as the SQLite command-line client prints them.
[[nodiscard]] std::string tables_of(const ScratchDirectory& directory, const std::string& run);

/// The same files with the same bytes, run.sqlite by content; timing.json may differ.
void expect_same_run(const ScratchDirectory& directory, const std::string& a, const std::string& b);

}  // namespace cistern
