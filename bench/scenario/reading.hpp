#pragma once
/// \file
/// Reads one TOML table by its list of keys. Internal to bench/scenario, since it shows toml++.
#include <fmt/format.h>

#include <algorithm>
#include <set>
#include <string>
#include <vector>

#include "bench/scenario/key.hpp"
#include "traces/base/spelling.hpp"

namespace cistern {

/// Knows which values came from --set, so that a message can say so.
struct ReadingContext {
  std::string file;
  std::set<std::string> overridden;  ///< full keys, entries by name

  [[nodiscard]] KeyPlace at(const std::string& key, const toml::node& node) const;
};

/// Entries of a table in the order of the file; those of --set last.
[[nodiscard]] std::vector<std::pair<std::string, const toml::node*>> entries_of(const toml::table& table);

/// The table behind a node, or a complaint that a table was expected.
[[nodiscard]] const toml::table& as_table(const toml::node& node, const KeyPlace& at);

template <typename Target>
const Key<Target>& find_key(const std::vector<Key<Target>>& keys, const std::string& name, const KeyPlace& at) {
  const auto found = std::find_if(keys.begin(), keys.end(), [&](const Key<Target>& key) { return key.name == name; });
  if (found != keys.end()) return *found;
  std::vector<std::string> known;
  for (const auto& key : keys) known.push_back(key.name);
  complain({at.place, ""}, fmt::format("unknown key `{}`; nearest: {}", at.key, nearest_word(name, known)));
}

/// Reads every entry of `table` into `target`; unknown keys and missing required ones are InputErrors.
/// \param prefix  full name of the table, "trigger.long"
template <typename Target>
void read_keys(const ReadingContext& context, const std::vector<Key<Target>>& keys, const toml::table& table,
               const std::string& prefix, Target& target) {
  for (const auto& [name, node] : entries_of(table)) {
    const KeyPlace at = context.at(prefix + "." + name, *node);
    find_key(keys, name, at).read(target, *node, at);
  }
  for (const auto& key : keys) {
    if (key.fallback != "required" || table.contains(key.name)) continue;
    complain(context.at(prefix, table), fmt::format("lacks the key `{}` ({}); expected it", key.name, key.range));
  }
}

}  // namespace cistern
