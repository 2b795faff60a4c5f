#include "traces/files/csv_header.hpp"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <charconv>

#include "traces/base/spelling.hpp"
#include "traces/files/file_facts.hpp"

namespace cistern {
namespace {

const std::vector<std::string> known_keys{"sample_rate_mhz", "bits",        "baseline_counts",
                                          "selection",       "live_time_s", "contiguous"};
constexpr std::string_view blanks = " \t";

template <typename Number>
Number read_number(const std::string& place, const std::string& key, std::string_view text, const char* expected) {
  Number value{};
  const auto [end, error] = std::from_chars(text.data(), text.data() + text.size(), value);
  if (error == std::errc{} && end == text.data() + text.size()) return value;
  throw InputError(place, fmt::format("{} is {}, expected {}", key, in_quotes(text), expected));
}

std::vector<std::int32_t> read_list(const std::string& place, const std::string& key, std::string_view text) {
  std::vector<std::int32_t> values;
  for (std::size_t at = 0; at <= text.size();) {
    const std::size_t comma = std::min(text.find(',', at), text.size());
    values.push_back(
        read_number<std::int32_t>(place, key, text.substr(at, comma - at), "whole numbers joined by commas"));
    at = comma + 1;
  }
  return values;
}

bool read_flag(const std::string& place, const std::string& key, std::string_view text) {
  if (text == "true" || text == "false") return text == "true";
  throw InputError(place, fmt::format("{} is {}, expected true or false", key, in_quotes(text)));
}

void take_key(const std::string& place, const std::string& key, std::string_view value, TraceFileInfo& info) {
  if (key == "sample_rate_mhz") {
    info.sample_rate_mhz = read_number<double>(place, key, value, "a number");
    check_rate(place, *info.sample_rate_mhz);
  } else if (key == "bits") {
    info.bits = read_number<std::int32_t>(place, key, value, "a whole number from 4 to 15");
    check_bits(place, *info.bits);
  } else if (key == "baseline_counts") {
    info.baseline_counts = read_list(place, key, value);
  } else if (key == "selection") {
    check_selection(place, value);
    info.selection = std::string(value);
  } else if (key == "live_time_s") {
    info.live_time_s = read_number<double>(place, key, value, "a number");
    check_live_time(place, *info.live_time_s);
  } else if (key == "contiguous") {
    info.contiguous = read_flag(place, key, value);
  } else {
    throw InputError(place, fmt::format("unknown key {}; nearest: {}", in_quotes(key), nearest_word(key, known_keys)));
  }
}

std::vector<std::string_view> words_of(std::string_view line) {
  std::vector<std::string_view> words;
  for (std::size_t at = line.find_first_not_of(blanks); at < line.size();) {
    const std::size_t end = std::min(line.find_first_of(blanks, at), line.size());
    words.push_back(line.substr(at, end - at));
    at = line.find_first_not_of(blanks, end);
  }
  return words;
}

}  // namespace

void read_csv_comment(const std::string& place, std::string_view line, TraceFileInfo& info,
                      std::vector<std::string>& seen) {
  line.remove_prefix(std::min(line.find_first_not_of('#'), line.size()));
  if (line.find('=') == std::string_view::npos) return;
  for (const std::string_view word : words_of(line)) {
    const auto equals = word.find('=');
    // A list with blanks in it must not pass as its first number.
    if (equals == std::string_view::npos || equals == 0) {
      throw InputError(place, fmt::format("{} is not key=value without blanks, as expected of every word in a comment "
                                          "that has a =",
                                          in_quotes(word)));
    }
    const std::string key(word.substr(0, equals));
    if (std::find(seen.begin(), seen.end(), key) != seen.end()) {
      throw InputError(place, fmt::format("{} is said again, expected it once", in_quotes(key)));
    }
    take_key(place, key, word.substr(equals + 1), info);
    seen.push_back(key);
  }
}

std::size_t read_csv_columns(const std::string& place, std::string_view line) {
  std::string expected = "trace,sample";
  for (std::size_t channels = 1; channels <= 16; ++channels) {
    expected += fmt::format(",ch{}", channels - 1);
    if (line == expected) return channels;
  }
  throw InputError(place,
                   fmt::format("header is {}, expected trace,sample,ch0,ch1,... (1 to 16 channels)", in_quotes(line)));
}

std::string csv_head(const TraceFileInfo& info) {
  std::string head;
  if (info.sample_rate_mhz) head += fmt::format("# sample_rate_mhz={}\n", *info.sample_rate_mhz);
  if (info.bits) head += fmt::format("# bits={}\n", *info.bits);
  if (info.baseline_counts) head += fmt::format("# baseline_counts={}\n", fmt::join(*info.baseline_counts, ","));
  if (info.selection) head += fmt::format("# selection={}\n", *info.selection);
  if (info.live_time_s) head += fmt::format("# live_time_s={}\n", *info.live_time_s);
  if (info.contiguous) head += "# contiguous=true\n";
  head += "trace,sample";
  for (std::size_t c = 0; c < info.channels; ++c) head += fmt::format(",ch{}", c);
  return head + "\n";
}

}  // namespace cistern
