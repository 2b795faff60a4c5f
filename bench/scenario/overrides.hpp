#pragma once
/// \file
/// Puts --set KEY=VALUE into parsed TOML. Internal to bench/scenario, since it shows toml++.
#include <string>
#include <vector>

#include "bench/scenario/scenario.hpp"
#include "bench/scenario/tables.hpp"

namespace cistern {

/// Sets a key of a table, of a list's entry by its name, or of a named table; missing Single and
/// Named tables are made. \return the full key as the tables know it
std::string apply_override(const Override& override, const std::vector<Table>& tables, toml::table& root);

}  // namespace cistern
