/// \file
/// From a file to a checked Scenario: parse, override, read table by table.
#include <boost/crc.hpp>
#include <cerrno>
#include <cstring>
#include <fstream>
#include <set>
#include <sstream>

#include "bench/scenario/overrides.hpp"
#include "bench/scenario/tables.hpp"

namespace cistern {
namespace {

namespace fs = std::filesystem;
constexpr std::uintmax_t largest_file = 1 << 20;

std::string read_file(const fs::path& path) {
  const KeyPlace file{path.string(), ""};
  std::error_code error;
  const auto status = fs::status(path, error);
  if (!fs::exists(status)) complain(file, "no such file; expected a scenario (TOML)");
  if (!fs::is_regular_file(status)) complain(file, "is not a file; expected a scenario (TOML)");
  if (fs::file_size(path, error) > largest_file) complain(file, "is larger than 1 MiB; expected a scenario (TOML)");
  std::ifstream stream(path, std::ios::binary);
  if (!stream) complain(file, fmt::format("cannot be read ({}); expected a scenario (TOML)", std::strerror(errno)));
  std::ostringstream text;
  text << stream.rdbuf();
  if (text.str().empty()) complain(file, "is empty; expected a scenario (TOML) with [digitizer] and [[trigger]]");
  return text.str();
}

toml::table parse(const std::string& text, const std::string& file) {
  try {
    return toml::parse(text, file);
  } catch (const toml::parse_error& error) {
    const auto begin = error.source().begin;
    complain({fmt::format("{}:{}:{}", file, begin.line, begin.column), ""},
             fmt::format("not valid TOML: {}", error.description()));
  }
}

void refuse_unknown_tables(const ReadingContext& context, const toml::table& root) {
  std::vector<std::string> known;
  for (const Table& table : all_tables()) known.push_back(table.name);
  for (const auto& [name, node] : entries_of(root)) {
    if (std::find(known.begin(), known.end(), name) != known.end()) continue;
    const KeyPlace at = context.at(name, *node);
    const bool is_table = node->is_table() || node->is_array_of_tables();
    const std::string shown = shortened(name, 80);
    complain({at.place, ""}, fmt::format("unknown {} `{}`; nearest table: {}", is_table ? "table" : "key", shown,
                                         nearest_word(shown, known)));
  }
}

void read_list(const ReadingContext& context, const Table& table, const toml::node& node, Scenario& scenario) {
  const toml::array* list = node.as_array();
  if (list == nullptr || (!list->empty() && !list->is_homogeneous(toml::node_type::table))) {
    reject(context.at(table.name, node), node, fmt::format("[[{}]] entries", table.name));
  }
  std::set<std::string> names;
  for (const toml::node& entry : *list) {
    const toml::table& toml = *entry.as_table();
    const toml::node* name_node = toml.get("name");
    if (name_node == nullptr) {
      complain({context.at(table.name, toml).place, ""},
               fmt::format("missing key `name` in [[{}]]; expected 1 to 40 letters, digits, - and _", table.name));
    }
    const KeyPlace name_at = context.at(table.name + ".name", *name_node);
    const std::string name = read_name(*name_node, name_at);
    if (!names.insert(name).second) complain(name_at, fmt::format("got \"{}\" again, expected each name once", name));
    table.read(context, toml, table.name + "." + name, scenario);
  }
}

void read_named(const ReadingContext& context, const Table& table, const toml::node& node, Scenario& scenario) {
  for (const auto& [name, entry] : entries_of(as_table(node, context.at(table.name, node)))) {
    const std::string full_name = table.name + "." + name;
    const KeyPlace at = context.at(full_name, *entry);
    (void)read_name(toml::value<std::string>(name), {at.place, table.name});
    table.read(context, as_table(*entry, at), full_name, scenario);
  }
}

void read_table(const ReadingContext& context, const Table& table, const toml::node& node, Scenario& scenario) {
  switch (table.shape) {
    case TableShape::Single:
      table.read(context, as_table(node, context.at(table.name, node)), table.name, scenario);
      break;
    case TableShape::List: read_list(context, table, node, scenario); break;
    case TableShape::Named: read_named(context, table, node, scenario); break;
  }
}

/// CRC-32 and CRC-32C (the ISO-HDLC and ISCSI entries of the CRC catalogue) side by side, of the text and
/// the overrides, each after a byte 0, which no TOML text contains. It tells runs apart, it does not protect them.
std::string digest_of(const std::string& text, const std::vector<Override>& overrides) {
  std::string all = text;
  for (const Override& override : overrides) all += '\0' + override.key + '=' + override.value;
  boost::crc_32_type plain;
  plain.process_bytes(all.data(), all.size());
  boost::crc_optimal<32, 0x1EDC6F41, 0xFFFFFFFF, 0xFFFFFFFF, true, true> other;
  other.process_bytes(all.data(), all.size());
  return fmt::format("{:08x}{:08x}", plain.checksum(), other.checksum());
}

void check_whole(const std::string& file, const Scenario& scenario) {
  if (scenario.triggers.empty()) complain({file, ""}, "has no [[trigger]]; expected at least one");
}

}  // namespace

Scenario load_scenario(const fs::path& path, const std::vector<Override>& overrides) {
  const std::string file = path.string();
  const std::string text = read_file(path);
  toml::table root = parse(text, file);
  ReadingContext context;
  context.file = file;
  for (const Override& override : overrides) context.overridden.insert(apply_override(override, all_tables(), root));
  refuse_unknown_tables(context, root);
  Scenario scenario;
  scenario.path = path;
  scenario.digest = digest_of(text, overrides);
  if (!root.contains("digitizer")) {
    complain({file, ""}, "has no [digitizer]; expected it, with channels, sample_rate_mhz and bits");
  }
  for (const Table& table : all_tables()) {
    const toml::node* node = root.get(table.name);
    if (node != nullptr) read_table(context, table, *node, scenario);
    if (table.check) table.check({context, node == nullptr ? nullptr : node->as_table(), table.name}, scenario);
  }
  check_whole(file, scenario);
  return scenario;
}

}  // namespace cistern
