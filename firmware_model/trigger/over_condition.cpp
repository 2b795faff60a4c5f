/// \file
/// Method. A piece becomes one bit per sample and channel: over or not. What leaves the window is the same
/// bits `window` samples earlier, so they are kept in one contiguous run, which is moved to the front of its
/// space when it reaches the end. A channel that was quiet for a window and has no over-sample in the
/// piece costs no more than finding that out.
#include "firmware_model/trigger/over_condition.hpp"

#include <algorithm>
#include <bit>
#include <limits>

namespace cistern {
namespace {

constexpr std::int64_t lowest_code = std::numeric_limits<std::int16_t>::min();
constexpr std::int64_t highest_code = std::numeric_limits<std::int16_t>::max();

}  // namespace

OverCondition::OverCondition(const ConditionSettings& settings)
    : window_(reach_samples(settings)),
      needed_(settings.kind == TriggerKind::TimeOverThreshold ? settings.min_samples_over : 1),
      majority_(settings.majority),
      history_words_((static_cast<std::size_t>(window_) + 63) / 64) {
  for (std::size_t c = 0; c < settings.channel_enabled.size(); ++c) {
    if (!settings.channel_enabled[c]) continue;
    const std::int64_t level_code = std::int64_t{settings.baseline_counts[c]} + settings.level_counts[c];
    Channel channel;
    channel.index = c;
    channel.limit = static_cast<std::int16_t>(std::clamp(level_code - 1, lowest_code, highest_code));
    // As long again as what must be kept, so that moving it costs little however short the pieces are.
    channel.bits.resize(2 * history_words_ + 2 * words_per_piece + 1);
    channels_.push_back(std::move(channel));
  }
  reset();
}

void OverCondition::reset() {
  for (Channel& channel : channels_) {
    std::fill_n(channel.bits.begin(), history_words_, 0);
    channel.count = 0;
    channel.any = false;
  }
  now_ = next_ = history_words_;
}

void OverCondition::make_room() {
  if (next_ + words_per_piece + 1 <= 2 * (history_words_ + words_per_piece)) return;
  for (Channel& channel : channels_) {
    const auto kept = channel.bits.begin() + static_cast<std::ptrdiff_t>(next_ - history_words_);
    std::copy(kept, kept + static_cast<std::ptrdiff_t>(history_words_ + 1), channel.bits.begin());
  }
  next_ = history_words_;
}

bool OverCondition::mark(Channel& channel, std::span<const std::int16_t> codes, std::size_t first_place) {
  std::uint64_t* words = channel.bits.data() + now_;
  if (first_place == 0) return mark_above(codes.data(), codes.size(), channel.limit, words);
  std::uint64_t word = 0;
  const bool any = mark_above(codes.data(), codes.size(), channel.limit, &word);
  words[0] |= word << first_place;
  return any;
}

void OverCondition::count(Channel& channel, bool any_over, Stretch stretch) {
  if (window_ == 1) {  // every over-sample is a window of its own
    channel.any = any_over;
    return;
  }
  channel.any = false;
  if (!any_over && channel.count == 0) return;
  const Scanned scanned =
      mark_counts(channel.bits.data() + now_, stretch, window_, needed_, channel.count, channel.fulfilled.data());
  channel.count = scanned.value;
  channel.any = scanned.any;
}

const std::uint64_t* OverCondition::fulfilled(const Channel& channel) const {
  return window_ == 1 ? channel.bits.data() + now_ : channel.fulfilled.data();
}

bool OverCondition::process(const CodesView& piece, std::size_t first_place, PieceWords& condition) {
  make_room();
  now_ = next_;
  next_ += (first_place + piece.samples()) / 64;
  const Stretch stretch{first_place, piece.samples()};
  std::array<const std::uint64_t*, 16> words;
  std::size_t channels = 0;
  for (Channel& channel : channels_) {
    count(channel, mark(channel, piece.channel(channel.index), first_place), stretch);
    if (channel.any) words[channels++] = fulfilled(channel);
  }
  return combine(std::span(words).first(channels), majority_, stretch, condition);
}

/// Place of the first over-sample in the window that ends in `place`.
std::int64_t OverCondition::first_over(const Channel& channel, std::size_t place) const {
  const std::size_t first = 64 * now_ + place + 1 - static_cast<std::size_t>(window_);
  std::size_t word = first / 64;
  std::uint64_t over = channel.bits[word] & ~low_bits(first % 64);
  while (over == 0) over = channel.bits[++word];
  return static_cast<std::int64_t>(64 * word) + std::countr_zero(over) - static_cast<std::int64_t>(64 * now_);
}

std::int64_t OverCondition::onset(std::size_t place) const {
  auto earliest = static_cast<std::int64_t>(place);
  if (window_ == 1) return earliest;
  for (const Channel& channel : channels_) {
    if (!channel.any || ((channel.fulfilled[place / 64] >> (place % 64)) & 1) == 0) continue;
    earliest = std::min(earliest, first_over(channel, place));
  }
  return earliest;
}

}  // namespace cistern
