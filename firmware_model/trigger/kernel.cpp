#include "firmware_model/trigger/kernel.hpp"

#include <algorithm>
#include <bit>
#include <limits>
#include <utility>

#include "firmware_model/trigger/condition_kernel.hpp"

namespace cistern {
namespace {
constexpr std::int64_t never = std::numeric_limits<std::int64_t>::max();
}  // namespace

TriggerKernel::TriggerKernel(const TriggerSettings& settings)
    : stages_(settings.firing), reach_(reach_samples(settings.condition)) {
  assert_valid(settings, settings.condition.baseline_counts.size());
  condition_ = make_condition_kernel(settings.condition);
}

TriggerKernel::TriggerKernel(const TriggerKernel& other)
    : condition_(other.condition_->clone()),
      stages_(other.stages_),
      reach_(other.reach_),
      seen_(other.seen_),
      condition_was_true_(other.condition_was_true_) {}

TriggerKernel& TriggerKernel::operator=(const TriggerKernel& other) { return *this = TriggerKernel(other); }
TriggerKernel::TriggerKernel(TriggerKernel&&) noexcept = default;
TriggerKernel& TriggerKernel::operator=(TriggerKernel&&) noexcept = default;
TriggerKernel::~TriggerKernel() = default;

void TriggerKernel::reset() {
  condition_->reset();
  stages_.reset();
  seen_ = 0;
  condition_was_true_ = false;
}

void TriggerKernel::process(const CodesView& block, std::vector<Firing>& firings) {
  PieceWords condition;
  for (std::size_t first = 0; first < block.samples(); first += samples_per_piece) {
    const std::size_t samples = std::min(samples_per_piece, block.samples() - first);
    if (condition_->process(block.part(first, samples), condition)) {
      for (std::size_t offset = 0; offset < samples; offset += 64) {
        const auto count = static_cast<unsigned>(std::min<std::size_t>(64, samples - offset));
        take_word(condition[offset / 64] & low_bits(count), seen_, offset, count, firings);
      }
    } else {
      condition_was_true_ = false;
    }
    seen_ += static_cast<std::int64_t>(samples);
  }
}

/// Sample of the next firing from bit `from` on: an edge, or a re-firing after hold-off.
std::int64_t TriggerKernel::next_firing(std::uint64_t condition, std::uint64_t edges, std::int64_t first_sample,
                                        unsigned from) const {
  const std::uint64_t left = edges & ~low_bits(from);
  std::int64_t next = left == 0 ? never : first_sample + std::countr_zero(left);
  if (const auto again = stages_.refire_sample()) {
    const std::int64_t bit = *again - first_sample;
    if (bit >= from && bit < 64 && ((condition >> bit) & 1) != 0) next = std::min(next, *again);
  }
  return next;
}

void TriggerKernel::take_word(std::uint64_t condition, std::int64_t piece_start, std::size_t offset, unsigned samples,
                              std::vector<Firing>& firings) {
  const std::uint64_t edges = condition & ~((condition << 1) | (condition_was_true_ ? 1 : 0));
  const std::int64_t first_sample = piece_start + static_cast<std::int64_t>(offset);
  unsigned from = 0;
  while (condition != 0 && from < 64) {
    const std::int64_t sample = next_firing(condition, edges, first_sample, from);
    if (sample == never) break;
    firings.push_back({sample, piece_start + condition_->onset(sample - piece_start), stages_.judge(sample), sample < reach_});
    from = static_cast<unsigned>(sample - first_sample) + 1;
  }
  condition_was_true_ = ((condition >> (samples - 1)) & 1) != 0;
}

}  // namespace cistern
