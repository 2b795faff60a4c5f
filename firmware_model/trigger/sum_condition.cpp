/// \file
/// Method. The sum of a window changes by the code that enters less the code that leaves, so the baseline
/// only matters before the start. The codes of the past are kept in one contiguous run, which is moved to
/// the front of its space when it reaches the end. Sums are exact integers throughout.
#include "firmware_model/trigger/sum_condition.hpp"

#include <algorithm>

namespace cistern {

SumCondition::SumCondition(const ConditionSettings& settings)
    : length_(static_cast<std::size_t>(settings.length_samples)), majority_(settings.majority) {
  for (std::size_t c = 0; c < settings.channel_enabled.size(); ++c) {
    if (!settings.channel_enabled[c]) continue;
    Channel channel;
    channel.index = c;
    channel.baseline = static_cast<std::int16_t>(settings.baseline_counts[c]);
    channel.needed = settings.sum_counts[c];
    // As long again as what must be kept, so that moving it costs little however short the pieces are.
    channel.codes.resize(2 * length_ + samples_per_piece);
    channels_.push_back(std::move(channel));
  }
  reset();
}

void SumCondition::reset() {
  for (Channel& channel : channels_) {
    std::fill(channel.codes.begin(), channel.codes.end(), channel.baseline);
    channel.sum = 0;
  }
  next_ = length_;
}

void SumCondition::make_room(std::size_t samples) {
  if (next_ + samples <= 2 * length_ + samples_per_piece) return;
  for (Channel& channel : channels_) {
    const auto end = channel.codes.begin() + static_cast<std::ptrdiff_t>(next_);
    std::copy(end - static_cast<std::ptrdiff_t>(length_), end, channel.codes.begin());
  }
  next_ = length_;
}

bool SumCondition::process(const CodesView& piece, std::size_t first_place, PieceWords& condition) {
  make_room(piece.samples());
  const Stretch stretch{first_place, piece.samples()};
  std::array<const std::uint64_t*, 16> words;
  std::size_t channels = 0;
  for (Channel& channel : channels_) {
    const auto codes = piece.channel(channel.index);
    std::int16_t* now = channel.codes.data() + next_;
    std::copy(codes.begin(), codes.end(), now);
    const Scanned scanned = mark_sums(now, stretch, length_, channel.needed, channel.sum, channel.fulfilled.data());
    channel.sum = scanned.value;
    if (scanned.any) words[channels++] = channel.fulfilled.data();
  }
  next_ += piece.samples();
  return combine(std::span(words).first(channels), majority_, stretch, condition);
}

std::int64_t SumCondition::onset(std::size_t place) const {
  return static_cast<std::int64_t>(place) - static_cast<std::int64_t>(length_) + 1;
}

}  // namespace cistern
