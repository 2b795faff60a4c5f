#pragma once
/// \file
/// Checks that the three formats share. Internal to traces/files.
#include <cstdint>
#include <filesystem>
#include <string>
#include <string_view>

#include "traces/files/trace_file.hpp"

namespace cistern {

/// InputError "FILE: ..." unless the path is a file that is there and not empty.
void require_file(const std::filesystem::path& path);

/// InputErrors at `place` for values outside the contract.
void check_channels(const std::string& place, std::int64_t channels);
void check_bits(const std::string& place, std::int64_t bits);
void check_rate(const std::string& place, double rate_mhz);
void check_live_time(const std::string& place, double live_time_s);
void check_selection(const std::string& place, std::string_view selection);

/// A list with one value, or one per channel, to one per channel.
template <typename Value>
std::vector<Value> one_per_channel(const std::string& place, const char* name, std::vector<Value> values, std::size_t channels) {
  if (values.size() == 1) values.resize(channels, values.front());
  if (values.size() != channels) {
    throw InputError(place, std::string(name) + " has " + std::to_string(values.size()) + " values, expected one or " + std::to_string(channels) +
                                " (one per channel)");
  }
  return values;
}

/// InputError naming trace, channel and sample for the first code outside 0 .. 2^bits - 1.
/// \param first_sample  of the block, within the trace
void check_codes(const std::string& file, const TraceBlock& block, std::int32_t bits);

}  // namespace cistern
