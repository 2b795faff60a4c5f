#include "bench/scenario/reading.hpp"

namespace cistern {

KeyPlace ReadingContext::at(const std::string& key, const toml::node& node) const {
  if (overridden.contains(key)) return {"--set " + key, key};
  const auto line = node.source().begin.line;
  return {line == 0 ? file : fmt::format("{}:{}", file, line), key};
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

}  // namespace cistern
