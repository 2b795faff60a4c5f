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

/// Where a value stands, for messages: "FILE:LINE" or "--set KEY", its full key and the key's unit.
struct KeyPlace {
  std::string place;
  std::string key;     ///< "trigger.long.window_samples"
  std::string unit{};  ///< "" for none
};

/// "PLACE: KEY: got VALUE, expected EXPECTED (UNIT)". \param expected  "an integer from 1 to 16"
[[noreturn]] void reject(const KeyPlace& at, const toml::node& node, const std::string& expected);
/// A complaint in the complainer's own words. Whatever it quotes, it stays one line.
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

/// The range of a key that a later version will accept; its reader refuses every value.
inline constexpr const char* not_in_this_version = "not in this version";

/// What the manual and `explain` need of a key.
struct KeyDescription {
  std::string name;
  std::string unit;
  std::string fallback;
  std::string range;
  std::string sentence;
};

struct NumberRange {
  double low{-std::numeric_limits<double>::infinity()};
  double high{std::numeric_limits<double>::infinity()};
  bool low_is_open{false};
  bool high_is_open{false};
  [[nodiscard]] bool holds(double value) const;  ///< false for what is not a finite number
  [[nodiscard]] std::string text() const;  ///< "from 0 to 90", "more than 0 and at most 5", "at least 0", "" (any)
};

/// "a number from 0 to 90", "an integer".
[[nodiscard]] std::string number_in(const NumberRange& range);
[[nodiscard]] std::string integer_in(const NumberRange& range);

[[nodiscard]] double read_number(const toml::node& node, const KeyPlace& at, const NumberRange& range);
[[nodiscard]] std::int64_t read_integer(const toml::node& node, const KeyPlace& at, const NumberRange& range);
[[nodiscard]] bool read_switch(const toml::node& node, const KeyPlace& at);
/// \param choices  empty: any text of 1 to 2,000 bytes
[[nodiscard]] std::string read_text(const toml::node& node, const KeyPlace& at,
                                    const std::vector<std::string>& choices);
/// Letters, digits, - and _; 1 to 40 characters.
[[nodiscard]] std::string read_name(const toml::node& node, const KeyPlace& at);
/// One number or a list of them; not empty.
[[nodiscard]] std::vector<double> read_numbers(const toml::node& node, const KeyPlace& at, const NumberRange& range);
[[nodiscard]] std::vector<std::int64_t> read_integers(const toml::node& node, const KeyPlace& at,
                                                      const NumberRange& range);
/// The same, each larger than the one before.
[[nodiscard]] std::vector<double> read_rising(const toml::node& node, const KeyPlace& at, const NumberRange& range);
[[nodiscard]] std::vector<std::int64_t> read_rising_integers(const toml::node& node, const KeyPlace& at,
                                                             const NumberRange& range);

template <typename Target>
std::vector<KeyDescription> describe(const std::vector<Key<Target>>& keys) {
  std::vector<KeyDescription> descriptions;
  for (const auto& key : keys) descriptions.push_back({key.name, key.unit, key.fallback, key.range, key.sentence});
  return descriptions;
}

}  // namespace cistern
