#pragma once
/// \file
/// Normally distributed numbers from 32-bit words by table: exact enough in the tails that rates of
/// noise crossings hold to 5 sigma, and the same bits on every machine (only +, * and comparisons).
#include <array>
#include <bit>
#include <cstddef>
#include <cstdint>

namespace cistern {

/// The quantile of the normal distribution as straight lines over the tail probability, whose pieces
/// shrink with it: 32 per factor of two, so no piece is off by more than 1e-4 standard deviations.
struct NormalTable {
  static constexpr int piece_bits = 5;
  static constexpr int mantissa_shift = 23 - piece_bits;
  static constexpr std::uint32_t first_index = 126U << piece_bits;        // of 0.5F
  static constexpr std::size_t pieces = std::size_t{33} << piece_bits;    // 0.5 to 2^31
  alignas(64) std::array<float, pieces> base;
  alignas(64) std::array<float, pieces> slope;
};
[[nodiscard]] const NormalTable& normal_table();

/// Bit 0 is the sign, the other bits are the tail probability in units of 2^-32.
[[nodiscard]] inline float normal_of(const NormalTable& table, std::uint32_t word) {
  const float tail = static_cast<float>(static_cast<std::int32_t>(word >> 1U)) + 0.5F;
  const std::uint32_t piece = (std::bit_cast<std::uint32_t>(tail) >> NormalTable::mantissa_shift) - NormalTable::first_index;
  const float size = table.base[piece] + table.slope[piece] * tail;
  return std::bit_cast<float>(std::bit_cast<std::uint32_t>(size) ^ (word << 31U));
}

}  // namespace cistern
