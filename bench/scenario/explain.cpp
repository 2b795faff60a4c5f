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

/// "trigger.long.majority" names the same key as "trigger.majority"; "majority" that of every table.
std::string without_entry_name(std::string_view key) {
  const auto first = key.find('.');
  const auto last = key.rfind('.');
  return first == last ? std::string(key) : std::string(key.substr(0, first)) + std::string(key.substr(last));
}

[[noreturn]] void refuse_unknown(std::string_view key) {
  std::vector<std::string> known;
  for (const Table& table : all_tables()) {
    known.push_back(table.name);
    const bool is_full = key.find('.') != std::string_view::npos;
    for (const KeyDescription& own : table.keys) known.push_back(is_full ? table.name + "." + own.name : own.name);
  }
  const std::string shown = shortened(std::string(key), 80);
  complain({"cistern explain", ""}, fmt::format("unknown key `{}`; nearest: {}", shown, nearest_word(shown, known)));
}

std::string escape_pipes(std::string text) {
  for (std::size_t at = text.find('|'); at != std::string::npos; at = text.find('|', at + 2)) text.insert(at, "\\");
  return text;
}

constexpr std::string_view manual_head = R"(# Scenario reference

A scenario is a TOML file. This page is generated from the lists that the program checks scenarios with;
`cistern explain KEY` prints the same. Values carry their units in their names. A per-channel value is one number for
all channels or a list with one per channel. Any key can be overridden on the command line:
`--set trigger.long.majority=3` (entries of a list go by their `name`), `--set requirements.quiet.at_most=40`. Values
are TOML, so a text keeps its quotes: `--set 'trigger.long.role="candidate"'`. All tables are checked whatever the
command; the first fault is reported, in one line. Paths are relative to the scenario.

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

A trigger needs one key of each pair of its kind: `threshold` a level (`level_counts` or `level_vem`);
`time_over_threshold` a level, a window (`window_samples` or `window_ns`) and a minimum (`min_samples_over` or
`min_ns_over`); `boxcar_sum` a length (`length_samples` or `length_ns`) and a sum (`sum_counts` or `sum_vem`).
)";

}  // namespace

std::string explain_keys(std::string_view key) {
  std::string text;
  for (const Table& table : all_tables()) {
    if (key.empty() || key == table.name) text += table_text(table) + (key.empty() ? "\n" : "");
    const std::string plain = without_entry_name(key);
    const bool is_full = plain.rfind(table.name + ".", 0) == 0;
    const std::string name = is_full ? plain.substr(table.name.size() + 1) : plain;
    if (const KeyDescription* own = find_key(table, name)) text += key_text(table, *own);
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
      text += fmt::format("| `{}` | {} | {} | {} | {} |\n", key.name, escape_pipes(key.unit),
                          escape_pipes(key.fallback), escape_pipes(key.range), escape_pipes(key.sentence));
    }
  }
  return text;
}

}  // namespace cistern
