#include "firmware_model/trigger/condition_kernel.hpp"

#include <algorithm>

#include "firmware_model/trigger/over_condition.hpp"
#include "firmware_model/trigger/sum_condition.hpp"

namespace cistern {
namespace {

/// Bits that are set in at least `majority` of the channels' words.
std::uint64_t at_least(std::span<const std::uint64_t* const> channels, std::size_t word, std::int32_t majority) {
  // reached[j]: bits set in at least j + 1 of the channels so far.
  std::array<std::uint64_t, 16> reached;
  const auto last = static_cast<std::size_t>(majority) - 1;
  std::fill_n(reached.begin(), majority, 0);
  for (const std::uint64_t* words : channels) {
    for (std::size_t j = last; j > 0; --j) reached[j] |= reached[j - 1] & words[word];
    reached[0] |= words[word];
  }
  return reached[last];
}

}  // namespace

std::unique_ptr<ConditionKernel> make_condition_kernel(const ConditionSettings& settings) {
  if (settings.kind == TriggerKind::BoxcarSum) return std::make_unique<SumCondition>(settings);
  return std::make_unique<OverCondition>(settings);
}

bool combine(std::span<const std::uint64_t* const> channels, std::int32_t majority, Stretch stretch,
             PieceWords& condition) {
  if (channels.size() < static_cast<std::size_t>(majority)) return false;
  const std::size_t end = stretch.first + stretch.samples;
  std::uint64_t any = 0;
  for (std::size_t word = 0; 64 * word < end; ++word) {
    condition[word] = at_least(channels, word, majority);
    if (word == 0) condition[word] &= ~low_bits(stretch.first);
    any |= condition[word];
  }
  return any != 0;
}

}  // namespace cistern
