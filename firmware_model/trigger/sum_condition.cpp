/// \file
/// Method. Within a word of 64 samples a sum cannot rise above its value before the word plus the
/// positive parts of (entering - leaving): two vectorised sums tell whether the word needs a closer
/// look. Sums are exact integers throughout.
#include "firmware_model/trigger/sum_condition.hpp"

#include <algorithm>

#include "firmware_model/trigger/block_scans.hpp"

namespace cistern {

SumCondition::SumCondition(const ConditionSettings& settings) : length_(settings.length_samples), majority_(settings.majority) {
  for (std::size_t c = 0; c < settings.channel_enabled.size(); ++c) {
    if (!settings.channel_enabled[c]) continue;
    Channel channel;
    channel.index = c;
    channel.baseline = static_cast<std::int16_t>(settings.baseline_counts[c]);
    channel.needed = settings.sum_counts[c];
    channel.codes.resize(static_cast<std::size_t>(length_) + samples_per_piece);
    channels_.push_back(std::move(channel));
  }
  reset();
}

void SumCondition::reset() {
  for (Channel& channel : channels_) {
    std::fill(channel.codes.begin(), channel.codes.end(), channel.baseline);
    channel.sum = 0;
  }
  seen_ = 0;
  last_samples_ = 0;
}

SumCondition::Word SumCondition::word_of(const Channel& channel, const CodesView& piece, std::size_t first) const {
  const auto samples = static_cast<unsigned>(std::min<std::size_t>(64, piece.samples() - first));
  return {piece.channel(channel.index).data() + first, channel.codes.data() + first, samples};
}

bool SumCondition::process(const CodesView& piece, PieceWords& condition) {
  const auto length = static_cast<std::size_t>(length_);
  seen_ += static_cast<std::int64_t>(last_samples_);
  last_samples_ = piece.samples();
  for (Channel& channel : channels_) {
    const auto codes = piece.channel(channel.index);
    std::copy(codes.begin(), codes.end(), channel.codes.begin() + static_cast<std::ptrdiff_t>(length));
  }
  std::uint64_t anywhere = 0;
  for (std::size_t first = 0; first < piece.samples(); first += 64) {
    condition[first / 64] = condition_of_word(piece, first);
    anywhere |= condition[first / 64];
  }
  for (Channel& channel : channels_) {
    const auto kept = channel.codes.begin() + static_cast<std::ptrdiff_t>(piece.samples());
    std::copy(kept, kept + static_cast<std::ptrdiff_t>(length), channel.codes.begin());
  }
  return anywhere != 0;
}

std::uint64_t SumCondition::condition_of_word(const CodesView& piece, std::size_t first) {
  std::array<std::int64_t, 16> after;
  std::array<bool, 16> is_possible;
  std::int32_t possible = 0;
  for (std::size_t i = 0; i < channels_.size(); ++i) {
    const Word word = word_of(channels_[i], piece, first);
    if (word.samples == 64) {
      const DifferenceSums sums = sum_differences(word.entering, word.leaving);
      after[i] = channels_[i].sum + sums.all;
      is_possible[i] = channels_[i].sum + sums.positive >= channels_[i].needed;
    } else {
      after[i] = channels_[i].sum;
      for (unsigned s = 0; s < word.samples; ++s) after[i] += word.entering[s] - word.leaving[s];
      is_possible[i] = true;
    }
    possible += is_possible[i] ? 1 : 0;
  }
  std::uint64_t result = 0;
  if (possible >= majority_) {
    std::array<std::uint64_t, 16> words{};
    for (std::size_t i = 0; i < channels_.size(); ++i) {
      if (!is_possible[i]) continue;
      const Word word = word_of(channels_[i], piece, first);
      std::int64_t sum = channels_[i].sum;
      for (unsigned s = 0; s < word.samples; ++s) {
        sum += word.entering[s] - word.leaving[s];
        words[i] |= std::uint64_t{sum >= channels_[i].needed} << s;
      }
    }
    result = at_least(std::span(words).first(channels_.size()), majority_);
  }
  for (std::size_t i = 0; i < channels_.size(); ++i) channels_[i].sum = after[i];
  return result;
}

std::int64_t SumCondition::onset(std::int64_t sample) const {
  return std::max(sample - length_ + 1, -seen_);
}

}  // namespace cistern
