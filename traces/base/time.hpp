#pragma once
/// \file
/// Time is int64 nanoseconds of continuous time since the GPS epoch (1980-01-06, no leap seconds).
#include <cstdint>

namespace cistern {

using GpsNanoseconds = std::int64_t;

/// Sampling instant of sample `sample` relative to sample 0: half-up(sample * 1000 / rate) ns.
/// Never a sum of rounded periods, so it does not drift. \param rate_mhz samples per microsecond, > 0.
[[nodiscard]] std::int64_t sample_offset_ns(std::int64_t sample, double rate_mhz);

/// Number of samples in `duration_ns`, rounded half up.
[[nodiscard]] std::int64_t samples_in_ns(double duration_ns, double rate_mhz);

}  // namespace cistern
