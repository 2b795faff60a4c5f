#include "bench/scenario/key.hpp"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <cmath>
#include <sstream>

#include "bench/scenario/text.hpp"
#include "traces/base/errors.hpp"
#include "traces/base/spelling.hpp"

namespace cistern {
namespace {

constexpr std::size_t longest_shown = 60;
constexpr std::size_t longest_key = 120;
constexpr std::size_t longest_list = 4096;

template <typename Value, typename ReadOne>
std::vector<Value> read_list(const toml::node& node, const KeyPlace& at, const ReadOne& read_one) {
  const toml::array* array = node.as_array();
  if (array == nullptr) return {read_one(node, at)};
  if (array->empty()) complain(at, "got an empty list, expected at least one value");
  if (array->size() > longest_list) {
    complain(at, fmt::format("got {} values, expected at most {}", array->size(), longest_list));
  }
  std::vector<Value> values;
  for (std::size_t i = 0; i < array->size(); ++i) {
    values.push_back(read_one((*array)[i], {at.place, fmt::format("{}[{}]", at.key, i), at.unit}));
  }
  return values;
}

template <typename Value>
void expect_rising(const std::vector<Value>& values, const toml::node& node, const KeyPlace& at) {
  const bool rises = std::adjacent_find(values.begin(), values.end(), std::greater_equal<>{}) == values.end();
  if (!rises) reject(at, node, "values that rise, each one once");
}

std::string with_range(const char* noun, const NumberRange& range) {
  const std::string text = range.text();
  return text.empty() ? noun : fmt::format("{} {}", noun, text);
}

bool is_name_character(char c) {
  return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || (c >= '0' && c <= '9') || c == '-' || c == '_';
}

}  // namespace

void complain(const KeyPlace& at, const std::string& what) {
  throw InputError(one_line(at.place),
                   one_line(at.key.empty() ? what : fmt::format("{}: {}", shortened(at.key, longest_key), what)));
}

void reject(const KeyPlace& at, const toml::node& node, const std::string& expected) {
  const std::string unit = at.unit.empty() ? "" : fmt::format(" ({})", at.unit);
  complain(at, fmt::format("got {}, expected {}{}", text_of(node), expected, unit));
}

std::string text_of(const toml::node& node) {
  std::ostringstream stream;
  const auto flags = toml::toml_formatter::default_flags & ~toml::format_flags::allow_literal_strings;
  stream << toml::toml_formatter(node, flags);  // quotes as in the expectation beside it
  return shortened(one_line(stream.str()), longest_shown);
}

bool NumberRange::holds(double value) const {
  if (!std::isfinite(value)) return false;
  return (low_is_open ? value > low : value >= low) && (high_is_open ? value < high : value <= high);
}

std::string NumberRange::text() const {
  const bool has_low = std::isfinite(low);
  const bool has_high = std::isfinite(high);
  if (has_low && has_high && !low_is_open && !high_is_open) return fmt::format("from {} to {}", low, high);
  std::string text;
  if (has_low) text += fmt::format("{} {}", low_is_open ? "more than" : "at least", low);
  if (has_low && has_high) text += " and ";
  if (has_high) text += fmt::format("{} {}", high_is_open ? "less than" : "at most", high);
  return text;
}

std::string number_in(const NumberRange& range) { return with_range("a number", range); }
std::string integer_in(const NumberRange& range) { return with_range("an integer", range); }

double read_number(const toml::node& node, const KeyPlace& at, const NumberRange& range) {
  const auto value = node.is_number() ? node.value<double>() : std::nullopt;
  if (!value || !range.holds(*value)) reject(at, node, number_in(range));
  return *value;
}

std::int64_t read_integer(const toml::node& node, const KeyPlace& at, const NumberRange& range) {
  const auto* integer = node.as_integer();
  if (integer == nullptr || !range.holds(static_cast<double>(integer->get()))) reject(at, node, integer_in(range));
  return integer->get();
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
           fmt::format("one of \"{}\"; nearest: \"{}\"", fmt::join(choices, "\", \""),
                       nearest_word(shortened(*text, longest_shown), choices)));
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
  expect_rising(values, node, at);
  return values;
}

std::vector<std::int64_t> read_rising_integers(const toml::node& node, const KeyPlace& at, const NumberRange& range) {
  auto values = read_integers(node, at, range);
  expect_rising(values, node, at);
  return values;
}

}  // namespace cistern
