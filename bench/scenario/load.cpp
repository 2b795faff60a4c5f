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
  const std::string file = path.string();
  std::error_code error;
  const auto status = fs::status(path, error);
  if (!fs::exists(status)) throw InputError(file, "no such file; expected a scenario (TOML)");
  if (!fs::is_regular_file(status)) throw InputError(file, "is not a file; expected a scenario (TOML)");
  if (fs::file_size(path, error) > largest_file)
    throw InputError(file, "is larger than 1 MiB; expected a scenario (TOML)");
  std::ifstream stream(path, std::ios::binary);
  if (!stream)
    throw InputError(file, fmt::format("cannot be read ({}); expected a scenario (TOML)", std::strerror(errno)));
  std::ostringstream text;
  text << stream.rdbuf();
  return text.str();
}

toml::table parse(const std::string& text, const std::string& file) {
  try {
    return toml::parse(text, file);
  } catch (const toml::parse_error& error) {
    std::string what(error.description());
    for (char& c : what) {
      if (static_cast<unsigned char>(c) < 0x20) c = ' ';
    }
    throw InputError(fmt::format("{}:{}:{}", file, error.source().begin.line, error.source().begin.column),
                     "not valid TOML: " + what);
  }
}

void refuse_unknown_tables(const ReadingContext& context, const toml::table& root) {
  std::vector<std::string> known;
  for (const Table& table : all_tables()) known.push_back(table.name);
  for (const auto& [name, node] : entries_of(root)) {
    if (std::find(known.begin(), known.end(), name) != known.end()) continue;
    const KeyPlace at = context.at(name, *node);
    const bool is_table = node->is_table() || node->is_array_of_tables();
    complain({at.place, ""}, fmt::format("unknown {} `{}`; nearest table: [{}]", is_table ? "table" : "key", name,
                                         nearest_word(name, known)));
  }
}

void read_entry(const ReadingContext& context, const Table& table, const toml::table& toml,
                const std::string& full_name, Scenario& scenario) {
  table.read(context, toml, full_name, scenario);
}

void read_list(const ReadingContext& context, const Table& table, const toml::node& node, Scenario& scenario) {
  const toml::array* list = node.as_array();
  if (list == nullptr || (!list->empty() && !list->is_homogeneous(toml::node_type::table))) {
    reject(context.at(table.name, node), node, fmt::format("[[{}]] entries", table.name));
  }
  std::set<std::string> names;
  for (const toml::node& entry : *list) {
    const toml::table& toml = *entry.as_table();
    const auto name = toml["name"].value<std::string>().value_or("?");
    const std::string full_name = table.name + "." + name;
    read_entry(context, table, toml, full_name, scenario);
    if (!names.insert(name).second)
      complain(context.at(full_name, toml), "has the name of an earlier entry, expected each name once");
  }
}

void read_named(const ReadingContext& context, const Table& table, const toml::node& node, Scenario& scenario) {
  for (const auto& [name, entry] : entries_of(as_table(node, context.at(table.name, node)))) {
    const std::string full_name = table.name + "." + name;
    const KeyPlace at = context.at(full_name, *entry);
    (void)read_name(toml::value<std::string>(name), {at.place, full_name});
    read_entry(context, table, as_table(*entry, at), full_name, scenario);
  }
}

void read_table(const ReadingContext& context, const Table& table, const toml::node& node, Scenario& scenario) {
  switch (table.shape) {
    case TableShape::Single:
      read_entry(context, table, as_table(node, context.at(table.name, node)), table.name, scenario);
      break;
    case TableShape::List: read_list(context, table, node, scenario); break;
    case TableShape::Named: read_named(context, table, node, scenario); break;
  }
}

/// CRC-32 (the ISO-HDLC entry of the CRC catalogue) of the text and the overrides, twice over with
/// different starts: 64 bits tell runs apart, they do not protect them.
std::string digest_of(const std::string& text, const std::vector<Override>& overrides) {
  std::string all = text;
  for (const Override& override : overrides) all += '\n' + override.key + '=' + override.value;
  boost::crc_32_type plain;
  plain.process_bytes(all.data(), all.size());
  boost::crc_optimal<32, 0x1EDC6F41, 0xFFFFFFFF, 0xFFFFFFFF, true, true> other;
  other.process_bytes(all.data(), all.size());
  return fmt::format("{:08x}{:08x}", plain.checksum(), other.checksum());
}

void check_whole(const std::string& file, const Scenario& scenario) {
  if (scenario.triggers.empty()) throw InputError(file, "has no [[trigger]]; expected at least one");
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
  if (!root.contains("digitizer"))
    throw InputError(file, "has no [digitizer]; expected it, with channels, sample_rate_mhz and bits");
  for (const Table& table : all_tables()) {
    const toml::node* node = root.get(table.name);
    if (node != nullptr) read_table(context, table, *node, scenario);
    if (table.check)
      table.check(node != nullptr ? context.at(table.name, *node) : KeyPlace{file, table.name}, scenario);
  }
  check_whole(file, scenario);
  return scenario;
}

}  // namespace cistern
