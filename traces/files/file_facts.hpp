#pragma once
/// \file
/// Checks that the three formats share. Internal to traces/files.
#include <cstdint>
#include <filesystem>
#include <string>
#include <string_view>
#include <vector>

#include "traces/base/errors.hpp"
#include "traces/files/trace_file.hpp"

namespace cistern {

/// Text of a file for a message: in quotes, at most 60 characters, control characters as \xNN.
[[nodiscard]] std::string in_quotes(std::string_view text);

/// InputError "FILE: ..." unless the path is a file that is there and not empty.
void require_file(const std::filesystem::path& path);

/// InputErrors at `place` for values outside the contract.
void check_shape(const std::string& place, const std::string& what, std::int64_t traces, std::int64_t channels,
                 std::int64_t samples);
void check_channels(const std::string& place, std::int64_t channels);
void check_bits(const std::string& place, std::int64_t bits);
void check_rate(const std::string& place, double rate_mhz);
void check_live_time(const std::string& place, double live_time_s);
void check_selection(const std::string& place, std::string_view selection);

/// Baselines as said in a file, to one per channel. They are ADC codes: InputError outside 0 .. 2^bits - 1.
[[nodiscard]] std::vector<std::int32_t> checked_baselines(const std::string& place, std::vector<std::int32_t> values,
                                                          std::size_t channels, std::optional<std::int32_t> bits);

/// A list with one value, or one per channel, to one per channel.
template <typename Value>
std::vector<Value> one_per_channel(const std::string& place, const char* name, std::vector<Value> values,
                                   std::size_t channels) {
  if (values.size() == 1) values.resize(channels, values.front());
  if (values.size() == channels) return values;
  const std::string expected = channels == 1 ? "one" : "one or " + std::to_string(channels) + " (one per channel)";
  throw InputError(place,
                   std::string(name) + " has " + std::to_string(values.size()) + " values, expected " + expected);
}

/// InputError naming trace, channel and sample for the first code outside 0 .. 2^bits - 1.
/// \param is_unsigned  the file holds uint16: its codes above 32,767 are negative in the block
void check_codes(const std::string& file, const TraceBlock& block, std::int32_t bits, bool is_unsigned);

}  // namespace cistern
