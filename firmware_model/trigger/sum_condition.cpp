/// \file
/// Method. The sum of a window changes by the code that enters less the code that leaves, so the baseline
/// only matters before the start. What leaves lies `length` samples back: in the piece itself, except for the
/// first ones. Those are copied behind the codes of the past, a contiguous run that is moved to the front
/// of its space when it reaches the end. Sums are exact integers throughout.
#include "firmware_model/trigger/sum_condition.hpp"

#include <algorithm>

namespace cistern {
namespace {

constexpr std::size_t spare_codes = 4'096;  // so that the run is moved now and then only, however short the pieces

std::ptrdiff_t distance(std::size_t samples) { return static_cast<std::ptrdiff_t>(samples); }

}  // namespace

SumCondition::SumCondition(const ConditionSettings& settings)
    : length_(static_cast<std::size_t>(settings.length_samples)), majority_(settings.majority) {
  for (std::size_t c = 0; c < settings.channel_enabled.size(); ++c) {
    if (!settings.channel_enabled[c]) continue;
    Channel channel;
    channel.index = c;
    channel.baseline = static_cast<std::int16_t>(settings.baseline_counts[c]);
    channel.needed = settings.sum_counts[c];
    channel.run.resize(2 * length_ + spare_codes);
    channels_.push_back(std::move(channel));
  }
  reset();
}

void SumCondition::reset() {
  for (Channel& channel : channels_) {
    std::fill_n(channel.run.begin(), length_, channel.baseline);
    channel.sum = 0;
  }
  next_ = length_;
}

void SumCondition::make_room(std::size_t samples) {
  if (next_ + samples <= 2 * length_ + spare_codes) return;
  for (Channel& channel : channels_) {
    const auto end = channel.run.begin() + distance(next_);
    std::copy(end - distance(length_), end, channel.run.begin());
  }
  next_ = length_;
}

/// \param head  samples whose window reaches before the piece, rounded up to whole words
bool SumCondition::mark(Channel& channel, std::span<const std::int16_t> codes, std::size_t first_place,
                        std::size_t head) {
  std::int16_t* now = channel.run.data() + next_;
  std::copy(codes.begin(), codes.begin() + distance(head), now);
  Scanned scanned = mark_sums(now, {first_place, head}, length_, channel.needed, channel.sum, channel.fulfilled.data());
  bool any = scanned.any;
  if (codes.size() > head) {
    scanned = mark_sums(codes.data() + head, {0, codes.size() - head}, length_, channel.needed, scanned.value,
                        channel.fulfilled.data() + head / 64);
    any |= scanned.any;
    std::copy(codes.end() - distance(length_), codes.end(), channel.run.begin());
  }
  channel.sum = scanned.value;
  return any;
}

bool SumCondition::process(const CodesView& piece, std::size_t first_place, PieceWords& condition) {
  const std::size_t head = std::min(piece.samples(), (length_ + 63) / 64 * 64);
  make_room(head);
  std::array<const std::uint64_t*, 16> words;
  std::size_t channels = 0;
  for (Channel& channel : channels_) {
    const bool any = mark(channel, piece.channel(channel.index), first_place, head);
    if (any) words[channels++] = channel.fulfilled.data();
  }
  next_ = piece.samples() > head ? length_ : next_ + head;
  return combine(std::span(words).first(channels), majority_, {first_place, piece.samples()}, condition);
}

std::int64_t SumCondition::onset(std::size_t place) const {
  return static_cast<std::int64_t>(place) - static_cast<std::int64_t>(length_) + 1;
}

}  // namespace cistern
