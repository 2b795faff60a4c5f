#include "bench/scenario/overrides.hpp"

#include <algorithm>

namespace cistern {
namespace {

constexpr std::size_t longest_shown = 60;

std::vector<std::string> split_key(const std::string& key) {
  std::vector<std::string> parts(1);
  for (const char c : key) {
    if (c == '.') {
      parts.emplace_back();
    } else {
      parts.back() += c;
    }
  }
  return parts;
}

KeyPlace place_of(const Override& override) { return {"--set " + shortened(override.key, 200), ""}; }

const Table& find_table(const Override& override, const std::vector<Table>& tables, const std::string& name) {
  std::vector<std::string> known;
  for (const Table& table : tables) {
    if (table.name == name) return table;
    known.push_back(table.name);
  }
  const std::string shown = shortened(name, longest_shown);
  complain(place_of(override), fmt::format("unknown table `{}`; nearest: {}", shown, nearest_word(shown, known)));
}

toml::table& entry_named(const Override& override, toml::table& root, const std::string& list,
                         const std::string& name) {
  std::vector<std::string> known;
  toml::array* entries = root[list].as_array();
  for (std::size_t i = 0; entries != nullptr && i < entries->size(); ++i) {
    toml::table* entry = (*entries)[i].as_table();
    if (entry == nullptr) continue;
    const auto own = (*entry)["name"].value<std::string>();
    if (own == name) return *entry;
    if (own) known.push_back(shortened(*own, longest_shown));
  }
  if (known.empty()) complain(place_of(override), fmt::format("the scenario has no [[{}]], expected one", list));
  const std::string shown = shortened(name, longest_shown);
  complain(place_of(override),
           fmt::format("no [[{}]] is named `{}`; nearest: {}", list, shown, nearest_word(shown, known)));
}

toml::table& table_at(const Override& override, toml::table& parent, const std::string& name) {
  if (!parent.contains(name)) parent.insert(name, toml::table{});
  toml::table* table = parent[name].as_table();
  if (table == nullptr)
    complain(place_of(override),
             fmt::format("`{}` is {} in the scenario, expected a table", name, text_of(*parent.get(name))));
  return *table;
}

/// VALUE is TOML: 3, 0.5, true, "text", [1, 2].
void set_value(const Override& override, toml::table& table, const std::string& key) {
  try {
    const toml::table parsed = toml::parse("v = " + override.value);
    if (parsed.size() != 1 || !parsed.contains("v"))
      complain(place_of(override),
               fmt::format("got {}, expected one TOML value", shortened(one_line(override.value), longest_shown)));
    table.insert_or_assign(key, *parsed.get("v"));
  } catch (const toml::parse_error&) {
    const std::string shown = shortened(one_line(override.value), longest_shown);
    complain(place_of(override),
             fmt::format("got {}, expected a TOML value: 3, 0.5, true, \"text\" (with its quotes) or [1, 2]", shown));
  }
}

/// [digitizer.baseline] is to be a table of its own: its keys are refused with it.
bool is_within_later_key(const Table& table, const std::vector<std::string>& parts) {
  return parts.size() == 3 && std::any_of(table.keys.begin(), table.keys.end(), [&](const KeyDescription& key) {
           return key.name == parts[1] && key.range == not_in_this_version;
         });
}

void check_depth(const Override& override, const Table& table, const std::vector<std::string>& parts) {
  const std::size_t depth = table.shape == TableShape::Single ? 2 : 3;
  if (parts.size() != depth && !is_within_later_key(table, parts)) {
    complain(place_of(override), fmt::format("expected {}.{}KEY=VALUE", table.name, depth == 3 ? "NAME." : ""));
  }
  if (table.shape == TableShape::List && parts.back() == "name") {
    complain(place_of(override), "expected another key: --set finds entries by their name, so it cannot change it");
  }
}

}  // namespace

std::string apply_override(const Override& override, const std::vector<Table>& tables, toml::table& root) {
  const auto parts = split_key(override.key);
  const Table& table = find_table(override, tables, parts.front());
  check_depth(override, table, parts);
  switch (table.shape) {
    case TableShape::Single: set_value(override, table_at(override, root, parts[0]), parts[1]); break;
    case TableShape::List: set_value(override, entry_named(override, root, parts[0], parts[1]), parts[2]); break;
    case TableShape::Named:
      set_value(override, table_at(override, table_at(override, root, parts[0]), parts[1]), parts[2]);
      break;
  }
  return table.shape == TableShape::Single ? parts[0] + "." + parts[1] : override.key;
}

}  // namespace cistern
