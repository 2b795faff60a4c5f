#pragma once
/// \file
/// Normally distributed numbers from 32-bit words by one look into a table: exact enough in the tails
/// that rates of noise crossings hold to 5 sigma, and the same bits on every machine.
#include <array>
#include <bit>
#include <cstddef>
#include <cstdint>

namespace cistern {

/// Sizes of normal deviates by their tail probability, in cells that shrink with it: 256 per factor
/// of two. A cell holds the mean of the deviates in it. So the probability to exceed any level is
/// right to half a cell, 0.2 %, up to 5 sigma; single steps are below 0.006 sigma. Ends at 6.3 sigma.
struct NormalTable {
  static constexpr int cell_bits = 8;
  static constexpr int mantissa_shift = 23 - cell_bits;
  static constexpr std::uint32_t first_cell = 126U << cell_bits;      // of 0.5F
  static constexpr std::size_t cells = std::size_t{33} << cell_bits;  // 0.5 to 2^31 and what it rounds to
  alignas(64) std::array<float, cells> size;
};
[[nodiscard]] const NormalTable& normal_table();

/// Bit 0 is the sign, the other bits are the tail probability in units of 2^-32. As a float its
/// exponent and leading mantissa bits number the cells.
[[nodiscard]] inline float normal_of(const NormalTable& table, std::uint32_t word) {
  const float tail = static_cast<float>(static_cast<std::int32_t>(word >> 1U)) + 0.5F;
  const std::uint32_t cell =
      (std::bit_cast<std::uint32_t>(tail) >> NormalTable::mantissa_shift) - NormalTable::first_cell;
  return std::bit_cast<float>(std::bit_cast<std::uint32_t>(table.size[cell]) ^ (word << 31U));
}

}  // namespace cistern
