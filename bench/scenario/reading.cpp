#include "bench/scenario/reading.hpp"

#include "bench/scenario/tables.hpp"

namespace cistern {

KeyPlace ReadingContext::at(const std::string& key, const toml::node& node) const {
  if (overridden.contains(key)) return {"--set " + key, key};
  const auto line = node.source().begin.line;
  if (line != 0) return {fmt::format("{}:{}", file, line), key};
  const auto within = overridden.lower_bound(key + ".");  // a table that --set made
  const bool is_made = within != overridden.end() && within->rfind(key + ".", 0) == 0;
  return {is_made ? "--set " + *within : file, key};
}

KeyPlace TableView::whole() const {
  return table == nullptr ? KeyPlace{context.file, full_name} : context.at(full_name, *table);
}

KeyPlace TableView::at(const std::string& key) const {
  const std::string full_key = full_name + "." + key;
  const toml::node* node = table == nullptr ? nullptr : table->get(key);
  return node == nullptr ? KeyPlace{whole().place, full_key} : context.at(full_key, *node);
}

KeyPlace TableView::blame(std::initializer_list<const char*> keys) const {
  std::string place;
  for (const char* key : keys) {
    if (table == nullptr || !table->contains(key)) continue;
    if (place.empty()) place = at(key).place;
    if (context.overridden.contains(full_name + "." + key)) {
      place = at(key).place;
      break;
    }
  }
  return {place.empty() ? whole().place : place, full_name + "." + *keys.begin()};
}

std::vector<std::pair<std::string, const toml::node*>> entries_of(const toml::table& table) {
  std::vector<std::pair<std::string, const toml::node*>> entries;
  for (const auto& [key, node] : table) entries.emplace_back(std::string(key.str()), &node);
  const auto position = [](const toml::node& node) {
    const auto begin = node.source().begin;
    return begin.line == 0 ? std::pair<std::uint32_t, std::uint32_t>{UINT32_MAX, 0}
                           : std::pair<std::uint32_t, std::uint32_t>{begin.line, begin.column};
  };
  std::stable_sort(entries.begin(), entries.end(),
                   [&](const auto& a, const auto& b) { return position(*a.second) < position(*b.second); });
  return entries;
}

const toml::table& as_table(const toml::node& node, const KeyPlace& at) {
  const toml::table* table = node.as_table();
  if (table == nullptr) reject(at, node, "a table");
  return *table;
}

std::string title_of(const std::string& full_name) {
  const auto dot = full_name.find('.');
  const std::string name = full_name.substr(0, dot);
  const std::string entry = dot == std::string::npos ? "" : full_name.substr(dot + 1);
  for (const Table& table : all_tables()) {
    if (table.name == name && table.shape == TableShape::List) return fmt::format("[[{}]] {}", name, entry);
  }
  return fmt::format("[{}]", full_name);
}

}  // namespace cistern
