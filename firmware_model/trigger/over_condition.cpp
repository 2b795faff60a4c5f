/// \file
/// Method. A piece becomes one bit per sample and channel (over or not). What leaves the window in a
/// word is the same bits `window` samples earlier, so a word of 64 samples needs the count before
/// it, the bits that enter and the bits that leave. The count cannot rise above count + entering
/// bits: unless that reaches the needed number on enough channels, the word is done with two
/// population counts. Only the others look at the single changes. A quiet piece after a quiet
/// history is done when its bits are found to be all zero.
#include "firmware_model/trigger/over_condition.hpp"

#include <algorithm>
#include <bit>
#include <limits>
#include <utility>

#include "firmware_model/trigger/block_scans.hpp"

namespace cistern {
namespace {

/// 64 bits from bit `first` on.
std::uint64_t bits_from(const std::vector<std::uint64_t>& bits, std::size_t first) {
  const std::size_t word = first / 64;
  const unsigned shift = first % 64;
  return shift == 0 ? bits[word] : (bits[word] >> shift) | (bits[word + 1] << (64 - shift));
}

/// Codes above it are over. A level beyond int16 is one that no code or every code reaches.
std::int16_t limit_of(std::int64_t level_code) {
  constexpr std::int64_t lowest = std::numeric_limits<std::int16_t>::min();
  constexpr std::int64_t highest = std::numeric_limits<std::int16_t>::max();
  return static_cast<std::int16_t>(std::clamp(level_code - 1, lowest, highest));
}

}  // namespace

OverCondition::OverCondition(const ConditionSettings& settings)
    : window_(reach_samples(settings)),
      needed_(settings.kind == TriggerKind::TimeOverThreshold ? settings.min_samples_over : 1),
      majority_(settings.majority),
      history_(64 * ((static_cast<std::size_t>(window_) + 63) / 64)) {
  for (std::size_t c = 0; c < settings.channel_enabled.size(); ++c) {
    if (!settings.channel_enabled[c]) continue;
    Channel channel;
    channel.index = c;
    channel.limit = limit_of(std::int64_t{settings.baseline_counts[c]} + settings.level_counts[c]);
    channel.bits.resize(history_ / 64 + words_per_piece + 1);
    channels_.push_back(std::move(channel));
  }
  reset();
}

void OverCondition::reset() {
  for (Channel& channel : channels_) {
    std::fill(channel.bits.begin(), channel.bits.end(), 0);
    channel.count = 0;
  }
  history_is_empty_ = true;
  last_samples_ = 0;
}

bool OverCondition::mark_piece(const CodesView& piece) {
  bool any = false;
  for (Channel& channel : channels_) {
    any |= mark_above(piece.channel(channel.index).data(), piece.samples(), channel.limit, channel.bits.data() + history_ / 64);
  }
  return any;
}

bool OverCondition::process(const CodesView& piece, PieceWords& condition) {
  // Only now, since onset() looks back from the last piece.
  forget(std::exchange(last_samples_, 0));
  const bool any = mark_piece(piece);
  if (!any && history_is_empty_) return false;
  std::uint64_t anywhere = 0;
  for (std::size_t first = 0; first < piece.samples(); first += 64) {
    const auto samples = static_cast<unsigned>(std::min<std::size_t>(64, piece.samples() - first));
    condition[first / 64] = condition_of_word(first / 64, samples);
    anywhere |= condition[first / 64];
  }
  last_samples_ = piece.samples();
  return anywhere != 0;
}

std::uint64_t OverCondition::condition_of_word(std::size_t word, unsigned samples) {
  std::array<std::uint64_t, 16> entering;
  std::array<std::uint64_t, 16> leaving;
  std::int32_t possible = 0;
  for (std::size_t i = 0; i < channels_.size(); ++i) {
    const Channel& channel = channels_[i];
    const std::size_t at = history_ + 64 * word;
    entering[i] = channel.bits[at / 64];
    leaving[i] = bits_from(channel.bits, at - static_cast<std::size_t>(window_)) & low_bits(samples);
    possible += channel.count + std::popcount(entering[i]) >= needed_ ? 1 : 0;
  }
  if (possible < majority_) {
    for (std::size_t i = 0; i < channels_.size(); ++i) channels_[i].count += std::popcount(entering[i]) - std::popcount(leaving[i]);
    return 0;
  }
  std::array<std::uint64_t, 16> words;
  for (std::size_t i = 0; i < channels_.size(); ++i) words[i] = fulfilled(channels_[i], entering[i], leaving[i], samples);
  return at_least(std::span(words).first(channels_.size()), majority_) & low_bits(samples);
}

/// Bit by bit whether the channel's count reaches the needed number; moves its count past the word.
std::uint64_t OverCondition::fulfilled(Channel& channel, std::uint64_t entering, std::uint64_t leaving, unsigned samples) const {
  const std::int32_t before = channel.count;
  channel.count += std::popcount(entering) - std::popcount(leaving);
  if (before + std::popcount(entering) < needed_) return 0;
  if (before - std::popcount(leaving) >= needed_) return low_bits(samples);
  // Between two changes the count stands still, so the bits of a whole stretch are equal.
  std::uint64_t result = 0;
  std::int32_t count = before;
  unsigned from = 0;
  for (std::uint64_t changes = entering ^ leaving; changes != 0; changes &= changes - 1) {
    const auto at = static_cast<unsigned>(std::countr_zero(changes));
    if (count >= needed_) result |= low_bits(at) & ~low_bits(from);
    count += ((entering >> at) & 1) != 0 ? 1 : -1;
    from = at;
  }
  if (count >= needed_) result |= ~low_bits(from);
  return result & low_bits(samples);
}

void OverCondition::forget(std::size_t samples) {
  if (samples == 0) return;
  std::uint64_t left = 0;
  for (Channel& channel : channels_) {
    for (std::size_t word = 0; word < history_ / 64; ++word) {
      channel.bits[word] = bits_from(channel.bits, samples + 64 * word);
      left |= channel.bits[word];
    }
  }
  history_is_empty_ = left == 0;
}

bool OverCondition::fulfils_at(const Channel& channel, std::int64_t sample) const {
  std::int32_t count = 0;
  const auto first = static_cast<std::size_t>(static_cast<std::int64_t>(history_) + sample - window_ + 1);
  for (std::size_t done = 0; done < static_cast<std::size_t>(window_); done += 64) {
    count += std::popcount(bits_from(channel.bits, first + done) & low_bits(static_cast<std::size_t>(window_) - done));
  }
  return count >= needed_;
}

std::int64_t OverCondition::onset(std::int64_t sample) const {
  const auto first = static_cast<std::size_t>(static_cast<std::int64_t>(history_) + sample - window_ + 1);
  std::int64_t earliest = sample;
  for (const Channel& channel : channels_) {
    if (!fulfils_at(channel, sample)) continue;
    for (std::size_t done = 0; done < static_cast<std::size_t>(window_); done += 64) {
      const std::uint64_t over = bits_from(channel.bits, first + done) & low_bits(static_cast<std::size_t>(window_) - done);
      if (over == 0) continue;
      earliest = std::min(earliest, static_cast<std::int64_t>(first + done) + std::countr_zero(over) - static_cast<std::int64_t>(history_));
      break;
    }
  }
  return earliest;
}

}  // namespace cistern
