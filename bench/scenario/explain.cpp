/// \file
/// The key lists as text for a terminal and as the reference manual.
#include "bench/scenario/tables.hpp"

namespace cistern {
namespace {

std::string heading_of(const Table& table) {
  switch (table.shape) {
    case TableShape::List: return "[[" + table.name + "]]";
    case TableShape::Named: return "[" + table.name + ".NAME]";
    case TableShape::Single: break;
  }
  return "[" + table.name + "]";
}

std::string key_text(const Table& table, const KeyDescription& key) {
  return fmt::format("{}.{}\n  {}\n  unit: {}\n  default: {}\n  accepted: {}\n", table.name, key.name, key.sentence,
                     key.unit.empty() ? "none" : key.unit, key.fallback, key.range);
}

std::string table_text(const Table& table) {
  std::string text = fmt::format("{}  {}\n", heading_of(table), table.sentence);
  for (const KeyDescription& key : table.keys) {
    text += fmt::format("  {:<34} {:<18} {}\n", key.name, key.unit, key.sentence);
  }
  return text;
}

const KeyDescription* find_key(const Table& table, std::string_view name) {
  for (const KeyDescription& key : table.keys) {
    if (key.name == name) return &key;
  }
  return nullptr;
}

/// "trigger.long.majority" names the same key as "trigger.majority".
std::string without_entry_name(std::string_view key) {
  const auto first = key.find('.');
  const auto last = key.rfind('.');
  return first == last ? std::string(key) : std::string(key.substr(0, first)) + std::string(key.substr(last));
}

[[noreturn]] void refuse_unknown(std::string_view key) {
  std::vector<std::string> known;
  for (const Table& table : all_tables()) {
    known.push_back(table.name);
    for (const KeyDescription& own : table.keys) known.push_back(table.name + "." + own.name);
  }
  throw InputError("cistern explain", fmt::format("unknown key `{}`; nearest: {}", key, nearest_word(key, known)));
}

std::string escape_pipes(std::string text) {
  for (std::size_t at = text.find('|'); at != std::string::npos; at = text.find('|', at + 2)) text.insert(at, "\\");
  return text;
}

constexpr std::string_view manual_head = R"(# Scenario reference

A scenario is a TOML file. This page is generated from the lists that the program checks scenarios with;
`cistern explain KEY` prints the same. Values carry their units in their names. A per-channel value is one number for
all channels or a list with one per channel. Any key can be overridden on the command line:
`--set trigger.long.majority=3` (entries of a list go by their `name`).

A scenario with only `[digitizer]` and `[[trigger]]` is enough for `replay` and for the logic part of `qualify`:

```toml
[digitizer]
channels = 4
sample_rate_mhz = 100
bits = 12
baseline_counts = [212, 198, 205, 221]

[[trigger]]
name = "long"
kind = "time_over_threshold"
level_counts = 64
window_samples = 150
min_samples_over = 21
majority = 2
```
)";

}  // namespace

std::string explain_keys(std::string_view key) {
  std::string text;
  for (const Table& table : all_tables()) {
    if (key.empty() || key == table.name) text += table_text(table) + (key.empty() ? "\n" : "");
    const std::string plain = without_entry_name(key);
    if (plain.rfind(table.name + ".", 0) != 0) continue;
    if (const KeyDescription* own = find_key(table, std::string_view(plain).substr(table.name.size() + 1)))
      text += key_text(table, *own);
  }
  if (text.empty()) refuse_unknown(key);
  return text;
}

std::string scenario_reference() {
  std::string text(manual_head);
  for (const Table& table : all_tables()) {
    text += fmt::format("\n## `{}`\n\n{}\n\n| key | unit | default | accepted | meaning |\n|---|---|---|---|---|\n",
                        heading_of(table), table.sentence);
    for (const KeyDescription& key : table.keys) {
      text += fmt::format("| `{}` | {} | {} | {} | {} |\n", key.name, key.unit, key.fallback, escape_pipes(key.range),
                          escape_pipes(key.sentence));
    }
  }
  return text;
}

}  // namespace cistern
