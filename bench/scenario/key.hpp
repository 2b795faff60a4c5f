#pragma once
/// \file
/// One list of keys per TOML table: name, unit, default, range, sentence, and how a value is read.
/// Checking, --set, `explain` and the reference manual read these lists alone.
/// Internal to bench/scenario, since it shows toml++.
#include <toml++/toml.h>
#include <cstdint>
#include <functional>
#include <limits>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace cistern {

struct Scenario;

/// Where a value stands, for messages: "FILE:LINE" or "--set KEY", and its full key.
struct KeyPlace {
  std::string place;
  std::string key;  ///< "trigger.long.window_samples"
};

/// A value that is not what its key wants. \param expected  "a whole number from 1 to 16"
[[noreturn]] void reject(const KeyPlace& at, const toml::node& node, const std::string& expected);
/// A complaint in the complainer's own words.
[[noreturn]] void complain(const KeyPlace& at, const std::string& what);
/// The value as the user wrote it, cut to a readable length, on one line.
[[nodiscard]] std::string text_of(const toml::node& node);

/// One key of a table that fills a `Target`.
template <typename Target>
struct Key {
  std::string name;
  std::string unit;      ///< "" for none
  std::string fallback;  ///< default as text; "required" or "none"
  std::string range;     ///< what is accepted
  std::string sentence;
  std::function<void(Target&, const toml::node&, const KeyPlace&)> read;
};

/// What the manual and `explain` need of a key.
struct KeyDescription {
  std::string name;
  std::string unit;
  std::string fallback;
  std::string range;
  std::string sentence;
};

/// A closed or half-open range of numbers.
struct NumberRange {
  double low{-std::numeric_limits<double>::infinity()};
  double high{std::numeric_limits<double>::infinity()};
  bool low_is_open{false};
  [[nodiscard]] bool holds(double value) const { return (low_is_open ? value > low : value >= low) && value <= high; }
  [[nodiscard]] std::string text() const;  ///< "from 0 to 90", "more than 0", "any"
};

[[nodiscard]] double read_number(const toml::node& node, const KeyPlace& at, const NumberRange& range);
[[nodiscard]] std::int64_t read_integer(const toml::node& node, const KeyPlace& at, const NumberRange& range);
[[nodiscard]] bool read_switch(const toml::node& node, const KeyPlace& at);
/// \param choices  empty: any text of 1 to 200 characters
[[nodiscard]] std::string read_text(const toml::node& node, const KeyPlace& at,
                                    const std::vector<std::string>& choices);
/// Letters, digits, - and _; 1 to 40 characters.
[[nodiscard]] std::string read_name(const toml::node& node, const KeyPlace& at);
/// One number or a list of them; not empty.
[[nodiscard]] std::vector<double> read_numbers(const toml::node& node, const KeyPlace& at, const NumberRange& range);
[[nodiscard]] std::vector<std::int64_t> read_integers(const toml::node& node, const KeyPlace& at,
                                                      const NumberRange& range);
/// A list that rises strictly.
[[nodiscard]] std::vector<double> read_rising(const toml::node& node, const KeyPlace& at, const NumberRange& range);

template <typename Target, typename Member>
Key<Target> number_key(std::string name, std::string unit, std::string fallback, NumberRange range,
                       std::string sentence, Member member) {
  return {std::move(name),
          std::move(unit),
          std::move(fallback),
          range.text(),
          std::move(sentence),
          [member, range](Target& target, const toml::node& node, const KeyPlace& at) {
            std::invoke(member, target) = read_number(node, at, range);
          }};
}

template <typename Target, typename Member>
Key<Target> integer_key(std::string name, std::string unit, std::string fallback, NumberRange range,
                        std::string sentence, Member member) {
  return {std::move(name),
          std::move(unit),
          std::move(fallback),
          "whole, " + range.text(),
          std::move(sentence),
          [member, range](Target& target, const toml::node& node, const KeyPlace& at) {
            auto& place = std::invoke(member, target);
            using Value = std::decay_t<decltype(place)>;
            if constexpr (requires { typename Value::value_type; }) {
              place = static_cast<typename Value::value_type>(read_integer(node, at, range));
            } else {
              place = static_cast<Value>(read_integer(node, at, range));
            }
          }};
}

template <typename Target>
std::vector<KeyDescription> describe(const std::vector<Key<Target>>& keys) {
  std::vector<KeyDescription> descriptions;
  for (const auto& key : keys) descriptions.push_back({key.name, key.unit, key.fallback, key.range, key.sentence});
  return descriptions;
}

}  // namespace cistern
