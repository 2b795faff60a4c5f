/// \file
/// Method: a vector of 64-bit lanes carries one 32-bit word of a counter in the lower half of each
/// lane, which is what the widening multiplication takes; upper halves are never looked at. Two such
/// states, of even and of odd draws, are merged into full vectors of words at the end.
#include "traces/frontend/noise_kernel.hpp"

#include "traces/base/errors.hpp"
#include "traces/base/random.hpp"
#include "traces/frontend/normal_table.hpp"

#undef HWY_TARGET_INCLUDE
#define HWY_TARGET_INCLUDE "traces/frontend/noise_kernel.cpp"
#include <hwy/foreach_target.h>  // IWYU pragma: keep
#include <hwy/highway.h>

HWY_BEFORE_NAMESPACE();
namespace cistern::HWY_NAMESPACE {

#if HWY_TARGET == HWY_SCALAR

template <typename Value, typename Store>
void for_groups(const PhiloxStream& stream, std::uint32_t first_group, Value* out, std::size_t size, Store store) {
  for (std::size_t at = 0; at < size; at += noise_group) {
    const std::uint32_t draw = (first_group + static_cast<std::uint32_t>(at / noise_group)) * 16;
    for (std::uint32_t lane = 0; lane < 16; ++lane) {
      const auto words =
          philox4x32_10({draw + lane, stream.counter[0], stream.counter[1], stream.counter[2]}, stream.key);
      for (std::size_t j = 0; j < 4; ++j) store(words[j], out + at + 16 * j + lane);
    }
  }
}

void write_words(const PhiloxStream& stream, std::uint32_t first_group, std::uint32_t* out, std::size_t size) {
  for_groups(stream, first_group, out, size, [](std::uint32_t word, std::uint32_t* to) { *to = word; });
}

void write_normals(const PhiloxStream& stream, std::uint32_t first_group, float* out, std::size_t size) {
  const NormalTable& table = normal_table();
  for_groups(stream, first_group, out, size, [&](std::uint32_t word, float* to) { *to = normal_of(table, word); });
}

void filter(const float* taps, std::size_t tap_count, const float* white, float* out, std::size_t size) {
  for (std::size_t i = 0; i < size; ++i) {
    float sum = taps[0] * white[i];
    for (std::size_t k = 1; k < tap_count; ++k)
      sum = sum + taps[k] * white[static_cast<std::ptrdiff_t>(i) - static_cast<std::ptrdiff_t>(k)];
    out[i] = sum;
  }
}

#else

namespace hn = hwy::HWY_NAMESPACE;
using Words = HWY_CAPPED(std::uint32_t, 16);
using WordVector = hn::Vec<Words>;
using WideVector = hn::Vec<hn::RepartitionToWide<Words>>;

struct State {
  WideVector x0, x1, x2, x3;
};

/// Ten rounds of Philox4x32 (Salmon et al. 2011).
HWY_INLINE State scramble(State s, std::array<std::uint32_t, 2> key) {
  const Words d;
  const hn::RepartitionToWide<Words> wide;
  const auto m0 = hn::Set(d, 0xD2511F53U);
  const auto m1 = hn::Set(d, 0xCD9E8D57U);
  for (int round = 0; round < 10; ++round) {
    const auto p0 = hn::MulEven(hn::BitCast(d, s.x0), m0);
    const auto p1 = hn::MulEven(hn::BitCast(d, s.x2), m1);
    s.x0 = hn::Xor(hn::Xor(hn::ShiftRight<32>(p1), s.x1), hn::Set(wide, std::uint64_t{key[0]}));
    s.x2 = hn::Xor(hn::Xor(hn::ShiftRight<32>(p0), s.x3), hn::Set(wide, std::uint64_t{key[1]}));
    s.x1 = p1;
    s.x3 = p0;
    key[0] += 0x9E3779B9U;
    key[1] += 0xBB67AE85U;
  }
  return s;
}

HWY_INLINE WordVector merge(WideVector even, WideVector odd) {
  const Words d;
  return hn::OddEven(hn::BitCast(d, hn::ShiftLeft<32>(odd)), hn::BitCast(d, even));
}

template <typename Value, typename Store>
HWY_INLINE void for_groups(const PhiloxStream& stream, std::uint32_t first_group, Value* out, std::size_t size,
                           Store store) {
  const Words d;
  const hn::RepartitionToWide<Words> wide;
  const std::size_t lanes = hn::Lanes(d);
  const auto steps = hn::ShiftLeft<1>(hn::Iota(wide, 0));
  const auto w1 = hn::Set(wide, std::uint64_t{stream.counter[0]});
  const auto w2 = hn::Set(wide, std::uint64_t{stream.counter[1]});
  const auto w3 = hn::Set(wide, std::uint64_t{stream.counter[2]});
  for (std::size_t at = 0; at < size; at += noise_group) {
    const std::uint32_t group_draw = (first_group + static_cast<std::uint32_t>(at / noise_group)) * 16;
    for (std::size_t lane = 0; lane < 16; lane += lanes) {
      const std::uint64_t draw = group_draw + static_cast<std::uint32_t>(lane);
      const State even = scramble({hn::Add(hn::Set(wide, draw), steps), w1, w2, w3}, stream.key);
      const State odd = scramble({hn::Add(hn::Set(wide, draw + 1), steps), w1, w2, w3}, stream.key);
      Value* const to = out + at + lane;
      store(merge(even.x0, odd.x0), to);
      store(merge(even.x1, odd.x1), to + 16);
      store(merge(even.x2, odd.x2), to + 32);
      store(merge(even.x3, odd.x3), to + 48);
    }
  }
}

void write_words(const PhiloxStream& stream, std::uint32_t first_group, std::uint32_t* out, std::size_t size) {
  for_groups(stream, first_group, out, size,
             [](WordVector words, std::uint32_t* to) HWY_ATTR { hn::StoreU(words, Words(), to); });
}

/// normal_of, lane by lane.
HWY_INLINE void store_normals(const NormalTable& table, WordVector words, float* to) {
  const Words d;
  const hn::RebindToSigned<Words> integers;
  const hn::RebindToFloat<Words> floats;
  const auto tail =
      hn::Add(hn::ConvertTo(floats, hn::BitCast(integers, hn::ShiftRight<1>(words))), hn::Set(floats, 0.5F));
  const auto cell =
      hn::Sub(hn::ShiftRight<NormalTable::mantissa_shift>(hn::BitCast(d, tail)), hn::Set(d, NormalTable::first_cell));
  const auto size = hn::GatherIndex(floats, table.size.data(), hn::BitCast(integers, cell));
  hn::StoreU(hn::Xor(size, hn::BitCast(floats, hn::ShiftLeft<31>(words))), floats, to);
}

void write_normals(const PhiloxStream& stream, std::uint32_t first_group, float* out, std::size_t size) {
  const NormalTable& table = normal_table();
  for_groups(stream, first_group, out, size,
             [&table](WordVector words, float* to) HWY_ATTR { store_normals(table, words, to); });
}

void filter(const float* taps, std::size_t tap_count, const float* white, float* out, std::size_t size) {
  const HWY_CAPPED(float, 16) d;
  const std::size_t lanes = hn::Lanes(d);
  std::size_t i = 0;
  for (; i + lanes <= size; i += lanes) {
    auto sum = hn::Mul(hn::Set(d, taps[0]), hn::LoadU(d, white + i));
    for (std::size_t k = 1; k < tap_count; ++k)
      sum = hn::Add(sum, hn::Mul(hn::Set(d, taps[k]), hn::LoadU(d, white + i - k)));
    hn::StoreU(sum, d, out + i);
  }
  for (; i < size; ++i) {
    float sum = taps[0] * white[i];
    for (std::size_t k = 1; k < tap_count; ++k) sum = sum + taps[k] * *(white + i - k);
    out[i] = sum;
  }
}

#endif

}  // namespace cistern::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#if HWY_ONCE
namespace cistern {

HWY_EXPORT(write_words);
HWY_EXPORT(write_normals);
HWY_EXPORT(filter);

void philox_words(const PhiloxStream& stream, std::uint32_t first_group, std::span<std::uint32_t> words) {
  CISTERN_ASSERT(words.size() % noise_group == 0);
  HWY_DYNAMIC_DISPATCH(write_words)(stream, first_group, words.data(), words.size());
}

void white_noise(const PhiloxStream& stream, std::uint32_t first_group, std::span<float> white) {
  CISTERN_ASSERT(white.size() % noise_group == 0);
  HWY_DYNAMIC_DISPATCH(write_normals)(stream, first_group, white.data(), white.size());
}

void filter_noise(std::span<const float> taps, const float* white, std::span<float> out) {
  CISTERN_ASSERT(!taps.empty());
  HWY_DYNAMIC_DISPATCH(filter)(taps.data(), taps.size(), white, out.data(), out.size());
}

}  // namespace cistern
#endif
