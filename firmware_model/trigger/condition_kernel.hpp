#pragma once
/// \file
/// Which samples make a condition true, 64 samples to a word. One class per kind of state: bits of
/// over-samples, or sliding sums. Internal to the kernel.
#include <array>
#include <cstddef>
#include <cstdint>
#include <memory>
#include <span>

#include "firmware_model/trigger/settings.hpp"
#include "traces/waveform/codes.hpp"

namespace cistern {

/// The kernel works through a block in pieces of at most this many samples.
inline constexpr std::size_t samples_per_piece = 8'192;
inline constexpr std::size_t words_per_piece = samples_per_piece / 64;

/// Bit s % 64 of word s / 64 belongs to sample s of the piece.
using PieceWords = std::array<std::uint64_t, words_per_piece>;

class ConditionKernel {
 public:
  virtual ~ConditionKernel() = default;
  [[nodiscard]] virtual std::unique_ptr<ConditionKernel> clone() const = 0;
  virtual void reset() = 0;

  /// Takes a piece of 1 to samples_per_piece samples.
  /// \param condition  bit by bit, whether the condition is true; written only when true is returned
  /// \return false when it is true nowhere in the piece
  [[nodiscard]] virtual bool process(const CodesView& piece, PieceWords& condition) = 0;

  /// Sample of the last piece at which the window that ends in `sample` first has an over-sample of a
  /// channel that fulfils the condition there; negative: before the piece.
  [[nodiscard]] virtual std::int64_t onset(std::int64_t sample) const = 0;
};

[[nodiscard]] std::unique_ptr<ConditionKernel> make_condition_kernel(const ConditionSettings& settings);

/// Bits that are set in at least `majority` of the words.
[[nodiscard]] std::uint64_t at_least(std::span<const std::uint64_t> words, std::int32_t majority);

/// The lowest `count` bits, 0 to 64.
[[nodiscard]] inline std::uint64_t low_bits(std::size_t count) {
  return count >= 64 ? ~std::uint64_t{0} : (std::uint64_t{1} << count) - 1;
}

}  // namespace cistern
