#include "bench/scenario/key.hpp"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <cmath>
#include <sstream>

#include "traces/base/errors.hpp"
#include "traces/base/spelling.hpp"

namespace cistern {
namespace {

constexpr std::size_t longest_shown = 60;

template <typename Value, typename ReadOne>
std::vector<Value> read_list(const toml::node& node, const KeyPlace& at, const ReadOne& read_one) {
  const toml::array* array = node.as_array();
  if (array == nullptr) return {read_one(node, at)};
  if (array->empty()) complain(at, "got an empty list, expected at least one value");
  std::vector<Value> values;
  for (std::size_t i = 0; i < array->size(); ++i) {
    values.push_back(read_one((*array)[i], {at.place, fmt::format("{}[{}]", at.key, i)}));
  }
  return values;
}

bool is_name_character(char c) {
  return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || (c >= '0' && c <= '9') || c == '-' || c == '_';
}

}  // namespace

void complain(const KeyPlace& at, const std::string& what) {
  throw InputError(at.place, at.key.empty() ? what : at.key + ": " + what);
}

void reject(const KeyPlace& at, const toml::node& node, const std::string& expected) {
  complain(at, fmt::format("got {}, expected {}", text_of(node), expected));
}

std::string text_of(const toml::node& node) {
  std::ostringstream stream;
  stream << toml::toml_formatter(node);
  std::string text = stream.str();
  for (char& c : text) {
    if (static_cast<unsigned char>(c) < 0x20 || c == 0x7f) c = ' ';
  }
  return text.size() <= longest_shown ? text : text.substr(0, longest_shown) + "...";
}

std::string NumberRange::text() const {
  const auto shown = [](double value) {
    return std::abs(value) >= 1e15 ? fmt::format("{:g}", value) : fmt::format("{}", value);
  };
  const bool bounded_below = std::isfinite(low);
  if (bounded_below && std::isfinite(high))
    return fmt::format("{}{} {} {}", low_is_open ? "more than " : "from ", shown(low),
                       low_is_open ? "and at most" : "to", shown(high));
  if (bounded_below) return low_is_open ? "more than " + shown(low) : "at least " + shown(low);
  return "any";
}

double read_number(const toml::node& node, const KeyPlace& at, const NumberRange& range) {
  const std::string expected = "a number" + (range.text() == "any" ? "" : ", " + range.text());
  const auto value = node.is_number() ? node.value<double>() : std::nullopt;
  if (!value || !std::isfinite(*value) || !range.holds(*value)) reject(at, node, expected);
  return *value;
}

std::int64_t read_integer(const toml::node& node, const KeyPlace& at, const NumberRange& range) {
  const std::string expected = "a whole number" + (range.text() == "any" ? "" : ", " + range.text());
  if (!node.is_integer()) reject(at, node, expected);
  const std::int64_t value = *node.value<std::int64_t>();
  if (!range.holds(static_cast<double>(value))) reject(at, node, expected);
  return value;
}

bool read_switch(const toml::node& node, const KeyPlace& at) {
  if (!node.is_boolean()) reject(at, node, "true or false");
  return *node.value<bool>();
}

std::string read_text(const toml::node& node, const KeyPlace& at, const std::vector<std::string>& choices) {
  const auto text = node.is_string() ? node.value<std::string>() : std::nullopt;
  if (choices.empty()) {
    if (!text || text->empty() || text->size() > 2000) reject(at, node, "a text of 1 to 2,000 characters");
    return *text;
  }
  if (!text) reject(at, node, fmt::format("one of \"{}\"", fmt::join(choices, "\", \"")));
  if (std::find(choices.begin(), choices.end(), *text) == choices.end()) {
    reject(at, node,
           fmt::format("one of \"{}\"; nearest: \"{}\"", fmt::join(choices, "\", \""), nearest_word(*text, choices)));
  }
  return *text;
}

std::string read_name(const toml::node& node, const KeyPlace& at) {
  const auto text = node.is_string() ? node.value<std::string>() : std::nullopt;
  const bool good =
      text && !text->empty() && text->size() <= 40 && std::all_of(text->begin(), text->end(), is_name_character);
  if (!good) reject(at, node, "a name of 1 to 40 letters, digits, - and _");
  return *text;
}

std::vector<double> read_numbers(const toml::node& node, const KeyPlace& at, const NumberRange& range) {
  return read_list<double>(
      node, at, [&](const toml::node& one, const KeyPlace& place) { return read_number(one, place, range); });
}

std::vector<std::int64_t> read_integers(const toml::node& node, const KeyPlace& at, const NumberRange& range) {
  return read_list<std::int64_t>(
      node, at, [&](const toml::node& one, const KeyPlace& place) { return read_integer(one, place, range); });
}

std::vector<double> read_rising(const toml::node& node, const KeyPlace& at, const NumberRange& range) {
  auto values = read_numbers(node, at, range);
  if (std::adjacent_find(values.begin(), values.end(), std::greater_equal<>{}) != values.end()) {
    reject(at, node, "numbers that rise, each one once");
  }
  return values;
}

}  // namespace cistern
