#include "traces/files/file_facts.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <cstring>

namespace cistern {
namespace fs = std::filesystem;
namespace {

constexpr std::size_t longest_quote = 60;
/// No file is as long, and the sum of bytes stays within int64.
constexpr std::int64_t longest_dimension = std::int64_t{1} << 46;

/// Whether any code has a bit above the lowest `bits`: one pass without a branch per sample.
bool has_code_beyond(std::span<const std::int16_t> codes, std::int32_t bits) {
  std::uint64_t seen = 0;
  std::size_t s = 0;
  for (; s + 4 <= codes.size(); s += 4) {
    std::uint64_t four = 0;
    std::memcpy(&four, codes.data() + s, sizeof four);
    seen |= four;
  }
  for (; s < codes.size(); ++s) seen |= static_cast<std::uint16_t>(codes[s]);
  const std::uint64_t beyond = static_cast<std::uint16_t>(0xFFFFU << static_cast<unsigned>(bits));
  return (seen & (beyond * 0x0001'0001'0001'0001U)) != 0;
}

}  // namespace

std::string in_quotes(std::string_view text) {
  std::string result = "\"";
  for (const char c : text.substr(0, longest_quote)) {
    const auto byte = static_cast<unsigned char>(c);
    result += byte < 0x20 || byte >= 0x7F ? fmt::format("\\x{:02x}", byte) : std::string(1, c);
  }
  return result + (text.size() > longest_quote ? "...\"" : "\"");
}

void require_file(const fs::path& path) {
  std::error_code error;
  const auto status = fs::status(path, error);
  if (!fs::exists(status)) throw InputError(path.string(), "no such file; expected recorded traces");
  if (fs::is_directory(status)) throw InputError(path.string(), "is a directory; expected a file of recorded traces");
  if (!fs::is_regular_file(status)) throw InputError(path.string(), "is not a file; expected recorded traces");
  if (fs::file_size(path, error) == 0) throw InputError(path.string(), "is empty; expected recorded traces");
}

void check_shape(const std::string& place, const std::string& what, std::int64_t traces, std::int64_t channels,
                 std::int64_t samples) {
  for (const std::int64_t length : {traces, channels, samples}) {
    if (length >= 1 && length <= longest_dimension) continue;
    throw InputError(
        place, fmt::format("{} has shape ({}, {}, {}), expected (traces, channels, samples), each at least 1", what,
                           traces, channels, samples));
  }
  check_channels(place, channels);
}

void check_channels(const std::string& place, std::int64_t channels) {
  if (channels < 1 || channels > 16) {
    throw InputError(place, fmt::format("has {} channels, expected 1 to 16", channels));
  }
}

void check_bits(const std::string& place, std::int64_t bits) {
  if (bits < 4 || bits > 15) throw InputError(place, fmt::format("bits is {}, expected 4 to 15", bits));
}

void check_rate(const std::string& place, double rate_mhz) {
  if (std::isfinite(rate_mhz) && rate_mhz > 0) return;
  throw InputError(place, fmt::format("sample_rate_mhz is {}, expected more than 0", rate_mhz));
}

void check_live_time(const std::string& place, double live_time_s) {
  if (std::isfinite(live_time_s) && live_time_s > 0) return;
  throw InputError(place, fmt::format("live_time_s is {}, expected more than 0", live_time_s));
}

void check_selection(const std::string& place, std::string_view selection) {
  constexpr std::string_view prefix = "triggered_by:";
  const bool is_triggered = selection.substr(0, prefix.size()) == prefix && selection.size() > prefix.size();
  const bool is_word = std::none_of(selection.begin(), selection.end(), [](char c) {
    const auto byte = static_cast<unsigned char>(c);
    return byte <= 0x20 || byte == 0x7F;
  });
  if (is_word && (selection == "unbiased" || is_triggered)) return;
  throw InputError(place, fmt::format("selection is {}, expected unbiased or triggered_by:NAME", in_quotes(selection)));
}

std::vector<std::int32_t> checked_baselines(const std::string& place, std::vector<std::int32_t> values,
                                            std::size_t channels, std::optional<std::int32_t> bits) {
  const std::int32_t largest = (1 << bits.value_or(15)) - 1;
  for (const std::int32_t value : values) {
    if (value >= 0 && value <= largest) continue;
    throw InputError(place, fmt::format("baseline_counts holds {}, expected 0 to {}", value, largest));
  }
  return one_per_channel(place, "baseline_counts", std::move(values), channels);
}

void check_codes(const std::string& file, const TraceBlock& block, std::int32_t bits, bool is_unsigned) {
  const std::int32_t largest = (1 << bits) - 1;
  for (std::size_t c = 0; c < block.codes.channels(); ++c) {
    const auto codes = block.codes.channel(c);
    if (!has_code_beyond(codes, bits)) continue;
    const auto bad =
        std::find_if(codes.begin(), codes.end(), [&](std::int16_t code) { return code < 0 || code > largest; });
    const std::int32_t code = is_unsigned ? static_cast<std::uint16_t>(*bad) : *bad;
    throw InputError(fmt::format("{}: trace {}, channel {}, sample {}", file, block.trace, c,
                                 block.first_sample + (bad - codes.begin())),
                     fmt::format("code is {}, expected 0 to {} ({} bits)", code, largest, bits));
  }
}

}  // namespace cistern
