#pragma once
/// \file
/// Which samples make a condition true, 64 samples to a word. One class per kind of state: bits of
/// over-samples, or sliding sums. Internal to the kernel.
#include <array>
#include <cstddef>
#include <cstdint>
#include <memory>
#include <span>

#include "firmware_model/trigger/block_scans.hpp"
#include "firmware_model/trigger/settings.hpp"
#include "traces/waveform/codes.hpp"

namespace cistern {

/// The kernel works through a block in pieces of at most this many samples.
inline constexpr std::size_t samples_per_piece = 16'384;
inline constexpr std::size_t words_per_piece = samples_per_piece / 64;

/// Bit b of word w belongs to place 64 w + b of the piece.
using PieceWords = std::array<std::uint64_t, words_per_piece>;

class ConditionKernel {
 public:
  virtual ~ConditionKernel() = default;
  [[nodiscard]] virtual std::unique_ptr<ConditionKernel> clone() const = 0;
  virtual void reset() = 0;

  /// Takes the next samples. Words stand still in time, so a piece may begin in the middle of one.
  /// \param first_place  place of the piece's first sample in its first word; unless 0, the piece ends in that word
  /// \param condition    whether the condition is true, 0 outside the piece; written only when true is returned
  /// \return false when it is true nowhere in the piece
  [[nodiscard]] virtual bool process(const CodesView& piece, std::size_t first_place, PieceWords& condition) = 0;

  /// The earliest over-sample, as a place of the last piece (negative: before it), in the window that ends
  /// in `place`, where the condition is true, among the channels that make it so.
  [[nodiscard]] virtual std::int64_t onset(std::size_t place) const = 0;
};

[[nodiscard]] std::unique_ptr<ConditionKernel> make_condition_kernel(const ConditionSettings& settings);

/// Sets bits of `condition` where at least `majority` channels have theirs set; bits outside the stretch are 0.
/// \return false when that is nowhere; then `condition` means nothing
[[nodiscard]] bool combine(std::span<const std::uint64_t* const> channels, std::int32_t majority, Stretch stretch,
                           PieceWords& condition);

/// The lowest `count` bits, 0 to 64.
[[nodiscard]] constexpr std::uint64_t low_bits(std::size_t count) {
  return count >= 64 ? ~std::uint64_t{0} : (std::uint64_t{1} << count) - 1;
}

}  // namespace cistern
