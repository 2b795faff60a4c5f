#include "traces/files/description.hpp"

#include <algorithm>
#include <bit>
#include <cmath>

namespace cistern {
namespace {

constexpr std::size_t segment_samples = 1'024;
constexpr std::size_t shortest_segment = 4;

struct Moments {
  double count{0};
  double mean{0};
  double rms{0};
};

/// Of the codes in [low, high]. Sums are taken about `low`, where they are exact.
Moments moments_of(const std::vector<std::int64_t>& histogram, std::int32_t low, std::int32_t high) {
  double count = 0;
  double sum = 0;
  double squares = 0;
  for (std::int32_t code = low; code <= high; ++code) {
    const auto n = static_cast<double>(histogram[static_cast<std::size_t>(code)]);
    const double away = code - low;
    count += n;
    sum += n * away;
    squares += n * away * away;
  }
  const double mean = sum / count;
  return {count, low + mean, std::sqrt(std::max(0.0, squares / count - mean * mean))};
}

/// rms of the codes at and below the most frequent one, mirrored: a start that no pulse can widen.
double lower_rms(const std::vector<std::int64_t>& histogram, std::int32_t smallest, std::int32_t mode) {
  double count = static_cast<double>(histogram[static_cast<std::size_t>(mode)]) / 2;
  double squares = 0;
  for (std::int32_t code = smallest; code < mode; ++code) {
    const auto n = static_cast<double>(histogram[static_cast<std::size_t>(code)]);
    count += n;
    squares += n * (mode - code) * (mode - code);
  }
  return std::sqrt(squares / count);
}

/// Repeats mean and rms of the codes within four rms (and at least one code) of the mean.
double rms_near(const std::vector<std::int64_t>& histogram, const ChannelDescription& d) {
  constexpr int rounds = 20;  // it settles within a few; a cycle would stop here
  Moments near{0, static_cast<double>(d.baseline), lower_rms(histogram, d.smallest, d.baseline)};
  for (int round = 0; round < rounds; ++round) {
    const double reach = std::max(1.0, 4 * near.rms);
    const auto low = std::max(d.smallest, static_cast<std::int32_t>(std::ceil(near.mean - reach)));
    const auto high = std::min(d.largest, static_cast<std::int32_t>(std::floor(near.mean + reach)));
    const Moments next = moments_of(histogram, low, high);
    if (next.count == near.count) break;
    near = next;
  }
  return near.rms;
}

}  // namespace

std::optional<double> TraceDescription::duration_s(std::optional<double> sample_rate_mhz) const {
  if (!sample_rate_mhz) return {};
  return static_cast<double>(samples) / (*sample_rate_mhz * 1e6);
}

TraceSurvey::TraceSurvey(std::size_t channels, std::int32_t bits)
    : bits_(bits), periodogram_(segment_samples), channels_(channels) {
  CISTERN_ASSERT(bits >= 4 && bits <= 15);
  for (Channel& channel : channels_) {
    channel.histogram.assign(std::size_t{1} << bits, 0);
    channel.power.assign(segment_samples / 2 + 1, 0);
  }
}

void TraceSurvey::take(const TraceBlock& block) {
  const bool is_first_trace = traces_ == 0;
  for (std::size_t c = 0; c < channels_.size(); ++c) {
    Channel& channel = channels_[c];
    const auto codes = block.codes.channel(c);
    for (const std::int16_t code : codes) ++channel.histogram[static_cast<std::size_t>(code)];
    if (block.first_sample == 0) channel.segment.clear();
    if (periodogram_) add_to_spectrum(channel, codes);
  }
  samples_ += static_cast<std::int64_t>(block.codes.samples());
  if (!block.last_of_trace) return;
  ++traces_;
  if (is_first_trace && samples_ < static_cast<std::int64_t>(segment_samples)) {
    shorten_segments(static_cast<std::size_t>(samples_));
  }
}

void TraceSurvey::add_to_spectrum(Channel& channel, std::span<const std::int16_t> codes) {
  const std::size_t size = periodogram_->size();
  while (!codes.empty()) {
    const std::size_t count = std::min(codes.size(), size - channel.segment.size());
    channel.segment.insert(channel.segment.end(), codes.begin(), codes.begin() + static_cast<std::ptrdiff_t>(count));
    codes = codes.subspan(count);
    if (channel.segment.size() < size) return;
    periodogram_->add(channel.segment, channel.power);
    ++channel.segments;
    channel.segment.clear();
  }
}

/// The first trace has shown that the traces are shorter than a segment; all of it still waits.
void TraceSurvey::shorten_segments(std::size_t trace_samples) {
  const std::size_t size = std::bit_floor(trace_samples);
  periodogram_.reset();
  if (size >= shortest_segment) periodogram_.emplace(size);
  for (Channel& channel : channels_) {
    const std::vector<std::int16_t> trace = std::move(channel.segment);
    channel.segment.clear();
    channel.power.assign(size / 2 + 1, 0);
    if (periodogram_) add_to_spectrum(channel, trace);
  }
}

ChannelDescription TraceSurvey::describe(const Channel& channel) const {
  ChannelDescription d;
  const auto& counts = channel.histogram;
  const auto is_there = [](std::int64_t count) { return count > 0; };
  const auto first = std::find_if(counts.begin(), counts.end(), is_there);
  if (first == counts.end()) return d;
  d.smallest = static_cast<std::int32_t>(first - counts.begin());
  d.largest = static_cast<std::int32_t>(counts.rend() - std::find_if(counts.rbegin(), counts.rend(), is_there)) - 1;
  d.baseline = static_cast<std::int32_t>(std::max_element(counts.begin(), counts.end()) - counts.begin());
  const Moments all = moments_of(counts, d.smallest, d.largest);
  d.mean = all.mean;
  d.rms = all.rms;
  d.noise_rms = rms_near(counts, d);
  d.at_zero = counts.front();
  d.at_largest_code = counts.back();
  for (const double power : channel.power) {
    if (channel.segments > 0) d.spectrum.push_back(power / static_cast<double>(channel.segments));
  }
  return d;
}

TraceDescription TraceSurvey::description() const {
  TraceDescription description{traces_, samples_, {}};
  for (const Channel& channel : channels_) description.channels.push_back(describe(channel));
  return description;
}

}  // namespace cistern
