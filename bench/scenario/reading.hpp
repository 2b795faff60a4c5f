#pragma once
/// \file
/// Reads one TOML table by its list of keys. Internal to bench/scenario, since it shows toml++.
#include <fmt/format.h>

#include <algorithm>
#include <initializer_list>
#include <set>
#include <string>
#include <vector>

#include "bench/scenario/key.hpp"
#include "bench/scenario/text.hpp"
#include "traces/base/spelling.hpp"

namespace cistern {

/// Knows which values came from --set, so that a message can say so.
struct ReadingContext {
  std::string file;
  std::set<std::string> overridden;  ///< full keys, entries by name

  [[nodiscard]] KeyPlace at(const std::string& key, const toml::node& node) const;
};

/// A table of the scenario, for checks of keys against each other. Borrows both.
struct TableView {
  const ReadingContext& context;
  const toml::table* table;  ///< null: the scenario does not have it
  std::string full_name;     ///< "trigger.long"

  [[nodiscard]] KeyPlace whole() const;
  /// Where a key stands; the table's place when it is not written.
  [[nodiscard]] KeyPlace at(const std::string& key) const;
  /// For keys that contradict each other: speaks of the first, and points at one that --set changed,
  /// else at the first that is written.
  [[nodiscard]] KeyPlace blame(std::initializer_list<const char*> keys) const;
};

/// Entries of a table in the order of the file; those of --set last.
[[nodiscard]] std::vector<std::pair<std::string, const toml::node*>> entries_of(const toml::table& table);

/// The table behind a node, or a complaint that a table was expected.
[[nodiscard]] const toml::table& as_table(const toml::node& node, const KeyPlace& at);

/// "[digitizer]", "[[trigger]] long", "[requirements.quiet]". \param full_name  "trigger.long"
[[nodiscard]] std::string title_of(const std::string& full_name);

template <typename Target>
const Key<Target>& find_key(const std::vector<Key<Target>>& keys, const std::string& name, const KeyPlace& at,
                            const std::string& table) {
  std::vector<std::string> known;
  for (const Key<Target>& key : keys) {
    if (key.name == name) return key;
    known.push_back(key.name);
  }
  const std::string shown = shortened(name, 80);
  complain({at.place, ""},
           fmt::format("unknown key `{}` in {}; nearest: {}", shown, title_of(table), nearest_word(shown, known)));
}

/// Reads every entry of `table` into `target`; unknown keys and missing required ones are InputErrors.
/// \param prefix  full name of the table, "trigger.long"
template <typename Target>
void read_keys(const ReadingContext& context, const std::vector<Key<Target>>& keys, const toml::table& table,
               const std::string& prefix, Target& target) {
  for (const auto& [name, node] : entries_of(table)) {
    KeyPlace at = context.at(prefix + "." + name, *node);
    const Key<Target>& key = find_key(keys, name, at, prefix);
    at.unit = key.unit;
    key.read(target, *node, at);
  }
  for (const auto& key : keys) {
    if (key.fallback != "required" || table.contains(key.name)) continue;
    complain({context.at(prefix, table).place, ""},
             fmt::format("missing key `{}` in {}; expected {}{}", key.name, title_of(prefix), key.range,
                         key.unit.empty() ? "" : " (" + key.unit + ")"));
  }
}

}  // namespace cistern
