#pragma once
/// \file
/// The vectorized inner loops of the electronic noise. The CPU's best instruction set is chosen at
/// run time; every one gives the same bits.
#include <array>
#include <cstddef>
#include <cstdint>
#include <span>

namespace cistern {

/// One Philox stream: counter words 1 to 3 and the key. Word 0 counts the draws.
struct PhiloxStream {
  std::array<std::uint32_t, 3> counter;
  std::array<std::uint32_t, 2> key;
};

/// Numbers come in groups of 64 from 16 draws: number 16 j + l of group g is word j of draw 16 g + l.
inline constexpr std::size_t noise_group = 64;

/// The words themselves. \param words  a whole number of groups
void philox_words(const PhiloxStream& stream, std::uint32_t first_group, std::span<std::uint32_t> words);

/// The words through the normal table. \param white  a whole number of groups
void white_noise(const PhiloxStream& stream, std::uint32_t first_group, std::span<float> white);

/// out[i] = sum over k of taps[k] * white[i - k], k rising; `white` points at the newest number for
/// out[0] and has taps.size() - 1 more before it.
void filter_noise(std::span<const float> taps, const float* white, std::span<float> out);

}  // namespace cistern
