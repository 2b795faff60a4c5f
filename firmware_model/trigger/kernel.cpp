#include "firmware_model/trigger/kernel.hpp"

#include <algorithm>
#include <bit>

#include "firmware_model/trigger/condition_kernel.hpp"
#include "traces/base/errors.hpp"

namespace cistern {

TriggerKernel::TriggerKernel(const TriggerSettings& settings)
    : channels_(settings.condition.baseline_counts.size()),
      stages_(settings.firing),
      reach_(reach_samples(settings.condition)) {
  assert_valid(settings, channels_);
  condition_ = make_condition_kernel(settings.condition);
}

TriggerKernel::TriggerKernel(const TriggerKernel& other)
    : channels_(other.channels_),
      condition_(other.condition_->clone()),
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
  CISTERN_ASSERT(block.channels() == channels_);
  PieceWords condition;
  std::size_t samples = 0;
  for (std::size_t first = 0; first < block.samples(); first += samples) {
    const auto place = static_cast<std::size_t>(seen_ % 64);
    samples = std::min(place == 0 ? samples_per_piece : 64 - place, block.samples() - first);
    if (condition_->process(block.part(first, samples), place, condition)) {
      take_piece(condition, place, samples, firings);
    } else {
      condition_was_true_ = false;
    }
    seen_ += static_cast<std::int64_t>(samples);
  }
}

void TriggerKernel::take_piece(std::span<const std::uint64_t> condition, std::size_t first_place, std::size_t samples,
                               std::vector<Firing>& firings) {
  const std::size_t end = first_place + samples;
  for (std::size_t word = 0; 64 * word < end; ++word) {
    const std::uint64_t before = condition_was_true_ ? std::uint64_t{1} << (word == 0 ? first_place : 0) : 0;
    if (condition[word] != 0) take_word(condition[word], before, 64 * word, firings);
    const std::size_t last = std::min<std::size_t>(63, end - 64 * word - 1);
    condition_was_true_ = ((condition[word] >> last) & 1) != 0;
  }
}

/// \param was_true     bits whose sample before was true, as far as `condition` does not say
/// \param first_place  place of the word's first bit in the piece
void TriggerKernel::take_word(std::uint64_t condition, std::uint64_t was_true, std::size_t first_place,
                              std::vector<Firing>& firings) {
  const std::uint64_t edges = condition & ~((condition << 1) | was_true);
  const std::int64_t piece_start = seen_ / 64 * 64;  // of place 0
  const std::int64_t word_start = piece_start + static_cast<std::int64_t>(first_place);
  std::uint64_t left = ~std::uint64_t{0};
  while (const auto bit = next_firing(condition & left, edges & left, word_start)) {
    const std::int64_t onset = piece_start + condition_->onset(first_place + *bit);
    const std::int64_t sample = word_start + *bit;
    firings.push_back({sample, std::max<std::int64_t>(0, onset), stages_.judge(sample), sample < reach_});
    left = ~low_bits(*bit + 1);
  }
}

/// Bit of the next edge, or of a re-firing after hold-off if that is earlier.
std::optional<unsigned> TriggerKernel::next_firing(std::uint64_t condition, std::uint64_t edges,
                                                   std::int64_t word_start) const {
  std::uint64_t fires = edges;
  if (const auto again = stages_.refire_sample()) {
    const std::int64_t bit = *again - word_start;
    if (bit >= 0 && bit < 64) fires |= condition & (std::uint64_t{1} << bit);
  }
  if (fires == 0) return {};
  return static_cast<unsigned>(std::countr_zero(fires));
}

}  // namespace cistern
