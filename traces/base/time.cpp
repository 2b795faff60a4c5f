#include "traces/base/time.hpp"

#include <cmath>

#include "traces/base/errors.hpp"
#include "traces/base/rounding.hpp"

namespace cistern {
namespace {
// A rate given in whole kHz (nearly every real one) is handled in integers: exact for any sample.
std::int64_t whole_khz(double rate_mhz) {
  const double khz = rate_mhz * 1000.0;
  const double nearest = std::round(khz);
  return std::abs(khz - nearest) < 1e-9 * khz ? static_cast<std::int64_t>(nearest) : 0;
}
}  // namespace

std::int64_t sample_offset_ns(std::int64_t sample, double rate_mhz) {
  CISTERN_ASSERT(rate_mhz > 0);
  if (const std::int64_t khz = whole_khz(rate_mhz); khz > 0) {
    // half-up(sample * 1e6 / khz) without overflow: whole milliseconds first, rest after.
    const std::int64_t whole_ms = sample / khz;
    const std::int64_t rest = sample % khz;
    return whole_ms * 1'000'000 + (2 * rest * 1'000'000 + khz) / (2 * khz);
  }
  return round_half_up(static_cast<double>(sample) * 1000.0 / rate_mhz);
}

std::int64_t samples_in_ns(double duration_ns, double rate_mhz) {
  return round_half_up(duration_ns * rate_mhz / 1000.0);
}

}  // namespace cistern
