#include "firmware_model/trigger/condition_kernel.hpp"

#include "firmware_model/trigger/over_condition.hpp"
#include "firmware_model/trigger/sum_condition.hpp"

namespace cistern {

std::unique_ptr<ConditionKernel> make_condition_kernel(const ConditionSettings& settings) {
  if (settings.kind == TriggerKind::BoxcarSum) return std::make_unique<SumCondition>(settings);
  return std::make_unique<OverCondition>(settings);
}

std::uint64_t at_least(std::span<const std::uint64_t> words, std::int32_t majority) {
  // reached[j]: bits set in at least j + 1 of the words so far.
  std::array<std::uint64_t, 16> reached{};
  for (const std::uint64_t word : words) {
    for (auto j = static_cast<std::size_t>(majority) - 1; j > 0; --j) reached[j] |= reached[j - 1] & word;
    reached[0] |= word;
  }
  return reached[static_cast<std::size_t>(majority) - 1];
}

}  // namespace cistern
