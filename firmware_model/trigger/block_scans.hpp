#pragma once
/// \file
/// The passes over codes and bits that take the time, dispatched to the CPU's best instruction set at
/// run time; the results do not depend on it. Internal to the kernel.
#include <cstddef>
#include <cstdint>

namespace cistern {

/// Sets bit s of `words` where codes[s] > limit; bits past the end are 0.
/// \param words  (samples + 63) / 64 of them
/// \return whether any bit is set
bool mark_above(const std::int16_t* codes, std::size_t samples, std::int16_t limit, std::uint64_t* words);

/// Where the samples of a scan lie in their words of 64.
struct Stretch {
  std::size_t first;  ///< place of the first one in the first word, 0 to 63
  std::size_t samples;
};

/// What a scan leaves behind.
struct Scanned {
  std::int64_t value;  ///< the count or the sum after the last sample
  bool any;            ///< whether a bit of `fulfilled` is set
};

/// Sets bits of `fulfilled` where the number of bits set among the last `window` ones is at least `needed`;
/// bits outside the stretch are 0.
/// \param bits    the words of the stretch; those of `window` bits before it must be readable
/// \param before  the count of the window that ends before the stretch
Scanned mark_counts(const std::uint64_t* bits, Stretch stretch, std::int32_t window, std::int32_t needed,
                    std::int64_t before, std::uint64_t* fulfilled);

/// Sets bits of `fulfilled` where the sum of the last `length` codes, less what it started with, is at least `needed`;
/// bits outside the stretch are 0.
/// \param codes   those of the stretch, 0 to 32,767; `length` codes before it must be readable
/// \param before  the sum of the window that ends before the stretch
Scanned mark_sums(const std::int16_t* codes, Stretch stretch, std::size_t length, std::int64_t needed,
                  std::int64_t before, std::uint64_t* fulfilled);

/// Sum of all samples modulo 2^16: the plainest read of memory, for benchmarks.
std::int64_t sum_codes(const std::int16_t* codes, std::size_t samples);

/// The instruction set that these passes use on this CPU, for example "AVX2".
const char* instruction_set();

}  // namespace cistern
