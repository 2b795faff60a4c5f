/// \file
/// Method. A word of 64 samples is judged as a whole first: the count (or sum) cannot leave the range from
/// its value before the word less all that leaves it, to that value plus all that enters it. Only a word whose
/// range holds the needed number is looked at sample by sample, still without a branch per sample:
/// counts eight at a time in the bytes of one integer, sums four at a time in a vector.
#include <algorithm>
#include <array>
#include <bit>
#include <cstdint>

#include "firmware_model/trigger/block_scans.hpp"
#include "firmware_model/trigger/condition_kernel.hpp"

#undef HWY_TARGET_INCLUDE
#define HWY_TARGET_INCLUDE "firmware_model/trigger/sliding_scans.cpp"
#include <hwy/foreach_target.h>
// The order of these two matters: foreach_target comes first.
#include <hwy/highway.h>

#ifndef CISTERN_RUNNING_COUNTS
#define CISTERN_RUNNING_COUNTS
namespace cistern {
/// Byte j of entry b: how many of the bits 0 to j of b are set.
inline constexpr auto running_counts = [] {
  std::array<std::uint64_t, 256> table{};
  for (unsigned byte = 0; byte < 256; ++byte) {
    for (unsigned j = 0; j < 8; ++j) {
      table[byte] |= static_cast<std::uint64_t>(std::popcount(byte & ((2u << j) - 1))) << (8 * j);
    }
  }
  return table;
}();
}  // namespace cistern
#endif

HWY_BEFORE_NAMESPACE();
namespace cistern::HWY_NAMESPACE {

namespace hn = hwy::HWY_NAMESPACE;

constexpr std::uint64_t one_in_every_byte = 0x0101010101010101;

/// Bits where the running count is at least the needed one.
/// \param above  count before the word less the needed one; it stays within -64 to 64 over the word,
///               so 128 + above never leaves its byte
HWY_INLINE std::uint64_t mark_count_word(std::int32_t above, std::uint64_t entering, std::uint64_t leaving) {
  constexpr std::uint64_t gather_lowest_bits = 0x0102040810204080;  // of every byte into the highest byte
  std::uint64_t result = 0;
  for (unsigned at = 0; at < 64; at += 8) {
    const std::uint64_t in = running_counts[(entering >> at) & 255];
    const std::uint64_t out = running_counts[(leaving >> at) & 255];
    const std::uint64_t counts = one_in_every_byte * static_cast<std::uint64_t>(128 + above) + in - out;
    result |= ((((counts >> 7) & one_in_every_byte) * gather_lowest_bits) >> 56) << at;
    above += static_cast<std::int32_t>(in >> 56) - static_cast<std::int32_t>(out >> 56);
  }
  return result;
}

Scanned MarkCounts(const std::uint64_t* bits, Stretch stretch, std::int32_t window, std::int32_t needed,
                   std::int64_t before, std::uint64_t* fulfilled) {
  const std::size_t end = stretch.first + stretch.samples;
  const std::uint64_t* left = bits - (window + 63) / 64;
  const auto shift = static_cast<unsigned>(-window & 63);
  auto count = static_cast<std::int32_t>(before);
  std::uint64_t any = 0;
  std::uint64_t mask = ~low_bits(stretch.first);
  for (std::size_t word = 0; 64 * word < end; ++word, mask = ~std::uint64_t{0}) {
    if (64 * word + 64 > end) mask &= low_bits(end - 64 * word);
    const std::uint64_t old = (left[word] >> shift) | (left[word + 1] << 1 << (63 - shift));
    const std::uint64_t entering = bits[word] & ~old & mask;
    const std::uint64_t leaving = old & ~bits[word] & mask;
    const std::int32_t highest = count + std::popcount(entering);
    const std::int32_t lowest = count - std::popcount(leaving);
    std::uint64_t result = lowest >= needed ? mask : 0;
    if (lowest < needed && highest >= needed) result = mark_count_word(count - needed, entering, leaving) & mask;
    count = highest + lowest - count;
    fulfilled[word] = result;
    any |= result;
  }
  return {count, any != 0};
}

/// Sums over 64 samples of codes - old, and of its positive part. Two codes differ by less than 2^15.
struct DifferenceSums {
  std::int32_t all;
  std::int32_t positive;
};

HWY_INLINE DifferenceSums sum_differences(const std::int16_t* codes, const std::int16_t* old);

/// Bits where the running sum of codes - old is at least `gap`.
HWY_INLINE std::uint64_t mark_sum_word(const std::int16_t* codes, const std::int16_t* old, std::int32_t gap);

#if HWY_TARGET == HWY_SCALAR  // has no vectors of four

HWY_INLINE DifferenceSums sum_differences(const std::int16_t* codes, const std::int16_t* old) {
  DifferenceSums sums{0, 0};
  for (std::size_t s = 0; s < 64; ++s) {
    sums.all += codes[s] - old[s];
    sums.positive += std::max(codes[s] - old[s], 0);
  }
  return sums;
}

HWY_INLINE std::uint64_t mark_sum_word(const std::int16_t* codes, const std::int16_t* old, std::int32_t gap) {
  std::int32_t sum = 0;
  std::uint64_t word = 0;
  for (std::size_t s = 0; s < 64; ++s) {
    sum += codes[s] - old[s];
    word |= std::uint64_t{sum >= gap} << s;
  }
  return word;
}

#else

// At most 64 lanes, so that a vector never holds more than one word.
using Codes16 = hn::CappedTag<std::int16_t, 64>;

HWY_INLINE DifferenceSums sum_differences(const std::int16_t* codes, const std::int16_t* old) {
  const Codes16 d;
  const hn::RepartitionToWide<Codes16> wide;
  const auto ones = hn::Set(d, 1);
  auto all = hn::Zero(wide);
  auto all_odd = hn::Zero(wide);
  auto positive = hn::Zero(wide);
  auto positive_odd = hn::Zero(wide);
  for (std::size_t s = 0; s < 64; s += hn::Lanes(d)) {
    const auto difference = hn::Sub(hn::LoadU(d, codes + s), hn::LoadU(d, old + s));
    all = hn::ReorderWidenMulAccumulate(wide, difference, ones, all, all_odd);
    positive = hn::ReorderWidenMulAccumulate(wide, hn::Max(difference, hn::Zero(d)), ones, positive, positive_odd);
  }
  return {hn::GetLane(hn::SumOfLanes(wide, hn::Add(all, all_odd))),
          hn::GetLane(hn::SumOfLanes(wide, hn::Add(positive, positive_odd)))};
}

HWY_INLINE std::uint64_t mark_sum_word(const std::int16_t* codes, const std::int16_t* old, std::int32_t gap) {
  const hn::CappedTag<std::int32_t, 4> d;
  const hn::Rebind<std::int16_t, decltype(d)> narrow;
  const auto limit = hn::Set(d, gap - 1);
  auto before = hn::Zero(d);
  std::uint64_t word = 0;
  for (std::size_t s = 0; s < 64; s += 4) {
    auto sum = hn::Sub(hn::PromoteTo(d, hn::LoadU(narrow, codes + s)), hn::PromoteTo(d, hn::LoadU(narrow, old + s)));
    sum = hn::Add(sum, hn::ShiftLeftLanes<1>(d, sum));
    sum = hn::Add(sum, hn::ShiftLeftLanes<2>(d, sum));
    sum = hn::Add(sum, before);
    before = hn::Broadcast<3>(sum);
    std::uint8_t bits[8] = {};
    hn::StoreMaskBits(d, hn::Gt(sum, limit), bits);
    word |= static_cast<std::uint64_t>(bits[0]) << s;
  }
  return word;
}

#endif

Scanned MarkSums(const std::int16_t* codes, Stretch stretch, std::size_t length, std::int64_t needed,
                 std::int64_t before, std::uint64_t* fulfilled) {
  const std::int16_t* old = codes - length;
  std::int64_t sum = before;
  std::uint64_t any = 0;
  std::size_t s = 0;
  const std::size_t whole = stretch.first == 0 ? stretch.samples / 64 * 64 : 0;
  for (; s < whole; s += 64) {
    const DifferenceSums differences = sum_differences(codes + s, old + s);
    const std::int64_t highest = sum + differences.positive;
    const std::int64_t lowest = sum + differences.all - differences.positive;
    std::uint64_t word = lowest >= needed ? ~std::uint64_t{0} : 0;
    // The gap is smaller than the steps in the word, so it fits.
    if (lowest < needed && highest >= needed)
      word = mark_sum_word(codes + s, old + s, static_cast<std::int32_t>(needed - sum));
    sum += differences.all;
    fulfilled[s / 64] = word;
    any |= word;
  }
  if (s < stretch.samples) {
    std::uint64_t word = 0;
    for (std::size_t i = s; i < stretch.samples; ++i) {
      sum += codes[i] - old[i];
      word |= std::uint64_t{sum >= needed} << (stretch.first + i - s);
    }
    fulfilled[s / 64] = word;
    any |= word;
  }
  return {sum, any != 0};
}

}  // namespace cistern::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#if HWY_ONCE
namespace cistern {

HWY_EXPORT(MarkCounts);
HWY_EXPORT(MarkSums);

Scanned mark_counts(const std::uint64_t* bits, Stretch stretch, std::int32_t window, std::int32_t needed,
                    std::int64_t before, std::uint64_t* fulfilled) {
  return HWY_DYNAMIC_DISPATCH(MarkCounts)(bits, stretch, window, needed, before, fulfilled);
}

Scanned mark_sums(const std::int16_t* codes, Stretch stretch, std::size_t length, std::int64_t needed,
                  std::int64_t before, std::uint64_t* fulfilled) {
  return HWY_DYNAMIC_DISPATCH(MarkSums)(codes, stretch, length, needed, before, fulfilled);
}

}  // namespace cistern
#endif
