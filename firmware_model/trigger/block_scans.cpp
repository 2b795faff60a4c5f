#include "firmware_model/trigger/block_scans.hpp"

#include <cstring>

#undef HWY_TARGET_INCLUDE
#define HWY_TARGET_INCLUDE "firmware_model/trigger/block_scans.cpp"
#include <hwy/foreach_target.h>
// The order of these two matters: foreach_target comes first.
#include <hwy/highway.h>

HWY_BEFORE_NAMESPACE();
namespace cistern::HWY_NAMESPACE {

namespace hn = hwy::HWY_NAMESPACE;

// At most 64 lanes, so that a vector never fills more than one word.
using Codes16 = hn::CappedTag<std::int16_t, 64>;

HWY_INLINE std::uint64_t mark_word(const std::int16_t* codes, hn::Vec<Codes16> limit) {
  const Codes16 d;
  const std::size_t lanes = hn::Lanes(d);
  std::uint64_t word = 0;
  for (std::size_t s = 0; s < 64; s += lanes) {
    std::uint8_t bits[8] = {};
    hn::StoreMaskBits(d, hn::Gt(hn::LoadU(d, codes + s), limit), bits);
    std::uint64_t part = 0;
    std::memcpy(&part, bits, sizeof part);
    word |= part << s;
  }
  return word;
}

bool MarkAbove(const std::int16_t* codes, std::size_t samples, std::int16_t limit, std::uint64_t* words) {
  const auto limits = hn::Set(Codes16(), limit);
  std::uint64_t any = 0;
  std::size_t s = 0;
  for (; s + 64 <= samples; s += 64) {
    const std::uint64_t word = mark_word(codes + s, limits);
    words[s / 64] = word;
    any |= word;
  }
  if (s < samples) {
    std::uint64_t word = 0;
    for (std::size_t i = s; i < samples; ++i) word |= std::uint64_t{codes[i] > limit} << (i - s);
    words[s / 64] = word;
    any |= word;
  }
  return any != 0;
}

DifferenceSums SumDifferences(const std::int16_t* entering, const std::int16_t* leaving) {
  const Codes16 d;
  const hn::RepartitionToWide<Codes16> wide;
  const auto zero = hn::Zero(wide);
  auto all = zero;
  auto positive = zero;
  const std::size_t half = hn::Lanes(wide);
  const hn::Half<Codes16> narrow;
  for (std::size_t s = 0; s < 64; s += half) {
    const auto difference =
        hn::Sub(hn::PromoteTo(wide, hn::LoadU(narrow, entering + s)), hn::PromoteTo(wide, hn::LoadU(narrow, leaving + s)));
    all = hn::Add(all, difference);
    positive = hn::Add(positive, hn::Max(difference, zero));
  }
  static_cast<void>(d);
  return {hn::GetLane(hn::SumOfLanes(wide, all)), hn::GetLane(hn::SumOfLanes(wide, positive))};
}

std::int64_t SumCodes(const std::int16_t* codes, std::size_t samples) {
  const Codes16 d;
  const std::size_t lanes = hn::Lanes(d);
  std::int64_t total = 0;
  auto a = hn::Zero(d);
  auto b = hn::Zero(d);
  std::size_t s = 0;
  for (; s + 2 * lanes <= samples; s += 2 * lanes) {
    a = hn::Add(a, hn::LoadU(d, codes + s));
    b = hn::Add(b, hn::LoadU(d, codes + s + lanes));
  }
  alignas(128) std::int16_t lane[64];
  hn::StoreU(hn::Add(a, b), d, lane);
  for (std::size_t i = 0; i < lanes; ++i) total += lane[i];
  for (; s < samples; ++s) total += codes[s];
  return total;
}

}  // namespace cistern::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#if HWY_ONCE
namespace cistern {

HWY_EXPORT(MarkAbove);
HWY_EXPORT(SumDifferences);
HWY_EXPORT(SumCodes);

bool mark_above(const std::int16_t* codes, std::size_t samples, std::int16_t limit, std::uint64_t* words) {
  return HWY_DYNAMIC_DISPATCH(MarkAbove)(codes, samples, limit, words);
}

DifferenceSums sum_differences(const std::int16_t* entering, const std::int16_t* leaving) {
  return HWY_DYNAMIC_DISPATCH(SumDifferences)(entering, leaving);
}

std::int64_t sum_codes(const std::int16_t* codes, std::size_t samples) {
  return HWY_DYNAMIC_DISPATCH(SumCodes)(codes, samples);
}

}  // namespace cistern
#endif
