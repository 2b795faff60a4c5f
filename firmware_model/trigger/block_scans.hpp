#pragma once
/// \file
/// The vectorised passes over codes, dispatched to the CPU's best instruction set at run time.
/// Internal to the kernel.
#include <cstddef>
#include <cstdint>

namespace cistern {

/// Sets bit s of `words` where codes[s] > limit; bits past the end are 0.
/// \param words  (samples + 63) / 64 of them
/// \return whether any bit is set
bool mark_above(const std::int16_t* codes, std::size_t samples, std::int16_t limit, std::uint64_t* words);

/// Sums over 64 samples of the difference entering - leaving, and of its positive part.
struct DifferenceSums {
  std::int32_t all;
  std::int32_t positive;
};
DifferenceSums sum_differences(const std::int16_t* entering, const std::int16_t* leaving);

/// Sum of all samples, modulo 2^16 in each vector lane: the plainest read of memory, for benchmarks.
std::int64_t sum_codes(const std::int16_t* codes, std::size_t samples);

}  // namespace cistern
