#include "traces/files/file_facts.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace cistern {
namespace fs = std::filesystem;

void require_file(const fs::path& path) {
  std::error_code error;
  const auto status = fs::status(path, error);
  if (!fs::exists(status)) throw InputError(path.string(), "no such file; expected recorded traces");
  if (!fs::is_regular_file(status)) throw InputError(path.string(), "is not a file; expected recorded traces");
  if (fs::file_size(path, error) == 0) throw InputError(path.string(), "is empty; expected recorded traces");
}

void check_channels(const std::string& place, std::int64_t channels) {
  if (channels < 1 || channels > 16) throw InputError(place, fmt::format("has {} channels, expected 1 to 16", channels));
}

void check_bits(const std::string& place, std::int64_t bits) {
  if (bits < 4 || bits > 15) throw InputError(place, fmt::format("bits is {}, expected 4 to 15", bits));
}

void check_rate(const std::string& place, double rate_mhz) {
  if (!std::isfinite(rate_mhz) || rate_mhz <= 0) throw InputError(place, fmt::format("sample_rate_mhz is {}, expected more than 0", rate_mhz));
}

void check_live_time(const std::string& place, double live_time_s) {
  if (!std::isfinite(live_time_s) || live_time_s <= 0) throw InputError(place, fmt::format("live_time_s is {}, expected more than 0", live_time_s));
}

void check_selection(const std::string& place, std::string_view selection) {
  constexpr std::string_view prefix = "triggered_by:";
  const bool is_triggered = selection.substr(0, prefix.size()) == prefix && selection.size() > prefix.size();
  if (selection == "unbiased" || is_triggered) return;
  throw InputError(place, fmt::format("selection is \"{}\", expected unbiased or triggered_by:NAME", selection.substr(0, 60)));
}

void check_codes(const std::string& file, const TraceBlock& block, std::int32_t bits) {
  const std::int16_t largest = static_cast<std::int16_t>((1 << bits) - 1);
  for (std::size_t c = 0; c < block.codes.channels(); ++c) {
    const auto codes = block.codes.channel(c);
    // One pass without a branch per sample; the place is looked for only when there is one.
    std::int16_t low = 0;
    std::int16_t high = 0;
    for (const std::int16_t code : codes) {
      low = std::min(low, code);
      high = std::max(high, code);
    }
    if (low >= 0 && high <= largest) continue;
    const auto bad = std::find_if(codes.begin(), codes.end(), [&](std::int16_t code) { return code < 0 || code > largest; });
    throw InputError(fmt::format("{}: trace {}, channel {}, sample {}", file, block.trace, c, block.first_sample + (bad - codes.begin())),
                     fmt::format("code is {}, expected 0 to {} ({} bits)", *bad, largest, bits));
  }
}

}  // namespace cistern
