#include "firmware_model/trigger/margin.hpp"

#include <algorithm>
#include <array>
#include <functional>
#include <utility>

namespace cistern {
namespace {
constexpr std::size_t samples_per_piece = 4'096;
}  // namespace

std::string_view margin_unit(TriggerKind kind) { return kind == TriggerKind::TimeOverThreshold ? "samples" : "counts"; }

MarginMeter::MarginMeter(const ConditionSettings& condition) : condition_(condition), reach_(reach_samples(condition)) {
  for (std::size_t c = 0; c < condition_.channel_enabled.size(); ++c) {
    if (condition_.channel_enabled[c]) channels_.push_back(c);
  }
  margins_.assign(channels_.size(), std::vector<std::int64_t>(samples_per_piece));
  reset();
}

void MarginMeter::reset() {
  ring_.assign(channels_.size(), std::vector<std::int32_t>(static_cast<std::size_t>(reach_), 0));
  sum_.assign(channels_.size(), 0);
  seen_ = 0;
  best_.reset();
}

void MarginMeter::process(const CodesView& block) {
  if (channels_.size() < static_cast<std::size_t>(condition_.majority)) return;
  for (std::size_t first = 0; first < block.samples(); first += samples_per_piece) {
    const std::size_t count = std::min(samples_per_piece, block.samples() - first);
    for (std::size_t e = 0; e < channels_.size(); ++e) measure(e, block.channel(channels_[e]).subspan(first, count));
    rank(count);
  }
}

/// Fills margins_[enabled] for the piece.
void MarginMeter::measure(std::size_t enabled, std::span<const std::int16_t> codes) {
  const std::size_t c = channels_[enabled];
  const std::int32_t baseline = condition_.baseline_counts[c];
  std::int64_t* margins = margins_[enabled].data();
  if (condition_.kind == TriggerKind::Threshold) {
    const std::int64_t level = std::int64_t{baseline} + condition_.level_counts[c];
    for (std::size_t s = 0; s < codes.size(); ++s) margins[s] = codes[s] - level;
    return;
  }
  const bool counts_over = condition_.kind == TriggerKind::TimeOverThreshold;
  const std::int64_t over_from = counts_over ? std::int64_t{baseline} + condition_.level_counts[c] : 0;
  const std::int64_t needed = counts_over ? condition_.min_samples_over : condition_.sum_counts[c];
  auto slot = static_cast<std::size_t>(seen_ % reach_);
  for (std::size_t s = 0; s < codes.size(); ++s) {
    const std::int32_t measured = counts_over ? (codes[s] >= over_from ? 1 : 0) : codes[s] - baseline;
    sum_[enabled] += measured - std::exchange(ring_[enabled][slot], measured);
    margins[s] = sum_[enabled] - needed;
    if (++slot == static_cast<std::size_t>(reach_)) slot = 0;
  }
}

/// Takes the majority-th largest channel of every sample of the piece.
void MarginMeter::rank(std::size_t samples) {
  const auto nth = static_cast<std::size_t>(condition_.majority - 1);
  std::array<std::int64_t, 16> values{};
  const auto end = values.begin() + static_cast<std::ptrdiff_t>(channels_.size());
  for (std::size_t s = 0; s < samples; ++s, ++seen_) {
    for (std::size_t e = 0; e < channels_.size(); ++e) values[e] = margins_[e][s];
    std::nth_element(values.begin(), values.begin() + static_cast<std::ptrdiff_t>(nth), end, std::greater<>{});
    if (!best_ || values[nth] > best_->margin) best_ = Best{seen_, values[nth]};
  }
}

}  // namespace cistern
