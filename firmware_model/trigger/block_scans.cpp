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

std::int64_t SumCodes(const std::int16_t* codes, std::size_t samples) {
  const Codes16 d;
  const std::size_t lanes = hn::Lanes(d);
  auto a = hn::Zero(d);
  auto b = hn::Zero(d);
  auto c = hn::Zero(d);
  auto e = hn::Zero(d);
  std::size_t s = 0;
  for (; s + 4 * lanes <= samples; s += 4 * lanes) {
    a = hn::Add(a, hn::LoadU(d, codes + s));
    b = hn::Add(b, hn::LoadU(d, codes + s + lanes));
    c = hn::Add(c, hn::LoadU(d, codes + s + 2 * lanes));
    e = hn::Add(e, hn::LoadU(d, codes + s + 3 * lanes));
  }
  a = hn::Add(a, c);
  b = hn::Add(b, e);
  alignas(128) std::int16_t lane[64];
  hn::StoreU(hn::Add(a, b), d, lane);
  std::uint32_t total = 0;
  for (std::size_t i = 0; i < lanes; ++i) total += static_cast<std::uint16_t>(lane[i]);
  for (; s < samples; ++s) total += static_cast<std::uint16_t>(codes[s]);
  return total & 0xffff;
}

const char* InstructionSet() { return hwy::TargetName(HWY_TARGET); }

}  // namespace cistern::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#if HWY_ONCE
namespace cistern {

HWY_EXPORT(MarkAbove);
HWY_EXPORT(SumCodes);
HWY_EXPORT(InstructionSet);

bool mark_above(const std::int16_t* codes, std::size_t samples, std::int16_t limit, std::uint64_t* words) {
  return HWY_DYNAMIC_DISPATCH(MarkAbove)(codes, samples, limit, words);
}

std::int64_t sum_codes(const std::int16_t* codes, std::size_t samples) {
  return HWY_DYNAMIC_DISPATCH(SumCodes)(codes, samples);
}

const char* instruction_set() { return HWY_DYNAMIC_DISPATCH(InstructionSet)(); }

}  // namespace cistern
#endif
