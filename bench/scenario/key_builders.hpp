#pragma once
/// \file
/// Builders that make a table's file a list: one call per key. What the manual says of range and
/// default cannot drift from what is checked: their texts are made from the range and from the part's
/// own Config.
/// \param fallback  from_config, "required", "none", or words for what a missing key means
/// \param member  a pointer to member of the Target, or a function from Target& to a field
/// Internal to bench/scenario, since it shows toml++.
#include <fmt/format.h>
#include <fmt/ranges.h>

#include <optional>
#include <utility>

#include "bench/scenario/key.hpp"
#include "traces/base/errors.hpp"

namespace cistern {

/// The default is the value that the field has by itself.
inline constexpr const char* from_config = "";

/// "" for a field that has no value by itself.
inline std::string default_text(bool value) { return value ? "true" : "false"; }
inline std::string default_text(const std::string& value) { return value; }
template <typename Number>
std::string default_text(Number value) {
  return fmt::format("{}", value);
}
template <typename Number>
std::string default_text(const std::vector<Number>& values) {
  return values.empty() ? "" : fmt::format("[{}]", fmt::join(values, ", "));
}
template <typename Field>
std::string default_text(const std::optional<Field>& value) {
  return value ? default_text(*value) : "";
}

template <typename Field>
struct Stored {
  using Type = Field;
};
template <typename Field>
struct Stored<std::optional<Field>> {
  using Type = Field;
};

template <typename Field, typename Number>
void store(Field& field, Number value) {
  field = static_cast<typename Stored<Field>::Type>(value);
}

template <typename Field, typename Number>
void store(Field& field, const std::vector<Number>& values) {
  using List = typename Stored<Field>::Type;
  List list;
  for (const Number value : values) list.push_back(static_cast<typename List::value_type>(value));
  field = std::move(list);
}

/// \param read  (node, place) to a value
template <typename Target, typename Member, typename Read>
Key<Target> make_key(KeyDescription about, Member member, Read read) {
  Target target{};
  if (about.fallback == from_config) about.fallback = default_text(std::invoke(member, target));
  CISTERN_ASSERT(!about.fallback.empty());
  return {std::move(about.name),
          std::move(about.unit),
          std::move(about.fallback),
          std::move(about.range),
          std::move(about.sentence),
          [member, read](Target& into, const toml::node& node, const KeyPlace& at) {
            store(std::invoke(member, into), read(node, at));
          }};
}

template <typename Target, typename Member>
Key<Target> number_key(std::string name, std::string unit, std::string fallback, NumberRange range,
                       std::string sentence, Member member) {
  return make_key<Target>({name, unit, fallback, number_in(range), sentence}, member,
                          [range](const auto& node, const KeyPlace& at) { return read_number(node, at, range); });
}

template <typename Target, typename Member>
Key<Target> integer_key(std::string name, std::string unit, std::string fallback, NumberRange range,
                        std::string sentence, Member member) {
  return make_key<Target>({name, unit, fallback, integer_in(range), sentence}, member,
                          [range](const auto& node, const KeyPlace& at) { return read_integer(node, at, range); });
}

template <typename Target, typename Member>
Key<Target> switch_key(std::string name, std::string fallback, std::string sentence, Member member) {
  return make_key<Target>({name, "", fallback, "true or false", sentence}, member,
                          [](const auto& node, const KeyPlace& at) { return read_switch(node, at); });
}

template <typename Target, typename Member>
Key<Target> text_key(std::string name, std::string fallback, std::string sentence, Member member) {
  return make_key<Target>({name, "", fallback, "a text", sentence}, member,
                          [](const auto& node, const KeyPlace& at) { return read_text(node, at, {}); });
}

template <typename Target, typename Member>
Key<Target> name_key(std::string sentence, Member member) {
  return make_key<Target>({"name", "", "required", "1 to 40 letters, digits, - and _", sentence}, member,
                          [](const auto& node, const KeyPlace& at) { return read_name(node, at); });
}

/// One number for all channels, or one each. The table checks the length (expect_per_channel).
template <typename Target, typename Member>
Key<Target> channel_numbers_key(std::string name, std::string unit, std::string fallback, NumberRange range,
                                std::string sentence, Member member) {
  return make_key<Target>({name, unit, fallback, number_in(range) + ", or one per channel", sentence}, member,
                          [range](const auto& node, const KeyPlace& at) { return read_numbers(node, at, range); });
}

template <typename Target, typename Member>
Key<Target> channel_integers_key(std::string name, std::string unit, std::string fallback, NumberRange range,
                                 std::string sentence, Member member) {
  return make_key<Target>({name, unit, fallback, integer_in(range) + ", or one per channel", sentence}, member,
                          [range](const auto& node, const KeyPlace& at) { return read_integers(node, at, range); });
}

template <typename Target, typename Member>
Key<Target> rising_key(std::string name, std::string unit, std::string fallback, NumberRange range,
                       std::string sentence, Member member) {
  return make_key<Target>({name, unit, fallback, "rising; each " + number_in(range), sentence}, member,
                          [range](const auto& node, const KeyPlace& at) { return read_rising(node, at, range); });
}

template <typename Target, typename Member>
Key<Target> rising_integers_key(std::string name, std::string unit, std::string fallback, NumberRange range,
                                std::string sentence, Member member) {
  return make_key<Target>(
      {name, unit, fallback, "rising; each " + integer_in(range), sentence}, member,
      [range](const auto& node, const KeyPlace& at) { return read_rising_integers(node, at, range); });
}

/// One of a few words, each of which means a value of the field.
template <typename Target, typename Choice, typename Member>
Key<Target> choice_key(std::string name, std::string fallback, std::vector<std::pair<std::string, Choice>> choices,
                       std::string sentence, Member member) {
  std::vector<std::string> words;
  Target target{};
  const bool is_from_config = fallback == from_config;
  for (const auto& [word, choice] : choices) {
    words.push_back(word);
    if (is_from_config && std::invoke(member, target) == choice) fallback = word;
  }
  CISTERN_ASSERT(!fallback.empty());
  return {std::move(name),
          "",
          std::move(fallback),
          fmt::format("one of {}", fmt::join(words, ", ")),
          std::move(sentence),
          [member, choices, words](Target& into, const toml::node& node, const KeyPlace& at) {
            const std::string word = read_text(node, at, words);
            for (const auto& [known, choice] : choices) {
              if (known == word) std::invoke(member, into) = choice;
            }
          }};
}

}  // namespace cistern
