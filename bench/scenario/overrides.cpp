#include "bench/scenario/overrides.hpp"

namespace cistern {
namespace {

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

KeyPlace place_of(const Override& override) { return {"--set " + override.key, ""}; }

const Table& find_table(const Override& override, const std::vector<Table>& tables, const std::string& name) {
  std::vector<std::string> known;
  for (const Table& table : tables) {
    if (table.name == name) return table;
    known.push_back(table.name);
  }
  complain(place_of(override), fmt::format("unknown table `{}`; nearest: {}", name, nearest_word(name, known)));
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
    if (own) known.push_back(*own);
  }
  complain(place_of(override),
           known.empty() ? fmt::format("the scenario has no [[{}]]", list)
                         : fmt::format("no [[{}]] is named `{}`; nearest: {}", list, name, nearest_word(name, known)));
}

toml::table& table_at(const Override& override, toml::table& parent, const std::string& name) {
  if (!parent.contains(name)) parent.insert(name, toml::table{});
  toml::table* table = parent[name].as_table();
  if (table == nullptr) complain(place_of(override), fmt::format("`{}` is not a table in the scenario", name));
  return *table;
}

/// VALUE is TOML: 3, 0.5, true, "text", [1, 2].
void set_value(const Override& override, toml::table& table, const std::string& key) {
  try {
    const toml::table parsed = toml::parse("v = " + override.value);
    if (parsed.size() != 1 || !parsed.contains("v"))
      complain(place_of(override), fmt::format("got {}, expected one TOML value", override.value.substr(0, 60)));
    table.insert_or_assign(key, *parsed.get("v"));
  } catch (const toml::parse_error&) {
    std::string shown = override.value.substr(0, 60);
    for (char& c : shown) {
      if (static_cast<unsigned char>(c) < 0x20) c = ' ';
    }
    complain(place_of(override),
             fmt::format("got {}, expected a TOML value: 3, 0.5, true, \"text\" (with its quotes) or [1, 2]", shown));
  }
}

}  // namespace

std::string apply_override(const Override& override, const std::vector<Table>& tables, toml::table& root) {
  const auto parts = split_key(override.key);
  const Table& table = find_table(override, tables, parts.front());
  const std::size_t depth = table.shape == TableShape::Single ? 2 : 3;
  if (parts.size() != depth) {
    complain(place_of(override), fmt::format("expected {}.{}KEY=VALUE", table.name, depth == 3 ? "NAME." : ""));
  }
  switch (table.shape) {
    case TableShape::Single: set_value(override, table_at(override, root, parts[0]), parts[1]); break;
    case TableShape::List: set_value(override, entry_named(override, root, parts[0], parts[1]), parts[2]); break;
    case TableShape::Named:
      set_value(override, table_at(override, table_at(override, root, parts[0]), parts[1]), parts[2]);
      break;
  }
  return override.key;
}

}  // namespace cistern
