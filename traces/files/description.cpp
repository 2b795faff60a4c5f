#include "traces/files/description.hpp"

#include <algorithm>
#include <cmath>
#include <complex>
#include <numbers>
#include <numeric>

namespace cistern {
namespace {

constexpr std::size_t spectrum_samples = 1'024;

/// Radix-2 Cooley-Tukey, in place; the size is a power of two.
void transform(std::vector<std::complex<double>>& values) {
  const std::size_t size = values.size();
  for (std::size_t i = 1, j = 0; i < size; ++i) {
    std::size_t bit = size >> 1;
    for (; (j & bit) != 0; bit >>= 1) j ^= bit;
    j ^= bit;
    if (i < j) std::swap(values[i], values[j]);
  }
  for (std::size_t length = 2; length <= size; length *= 2) {
    const std::complex<double> step = std::polar(1.0, -2 * std::numbers::pi / static_cast<double>(length));
    for (std::size_t start = 0; start < size; start += length) {
      std::complex<double> factor = 1;
      for (std::size_t i = 0; i < length / 2; ++i, factor *= step) {
        const auto even = values[start + i];
        const auto odd = values[start + i + length / 2] * factor;
        values[start + i] = even + odd;
        values[start + i + length / 2] = even - odd;
      }
    }
  }
}

double mean_of(std::span<const double> values) { return std::accumulate(values.begin(), values.end(), 0.0) / static_cast<double>(values.size()); }

}  // namespace

std::vector<double> power_spectrum(std::span<const double> samples) {
  const std::size_t size = samples.size();
  CISTERN_ASSERT(size >= 4 && (size & (size - 1)) == 0);
  std::vector<std::complex<double>> values(size);
  double window_power = 0;
  for (std::size_t n = 0; n < size; ++n) {
    const double window = 0.5 - 0.5 * std::cos(2 * std::numbers::pi * static_cast<double>(n) / static_cast<double>(size));
    window_power += window * window;
    values[n] = samples[n] * window;
  }
  transform(values);
  std::vector<double> power(size / 2 + 1);
  for (std::size_t k = 0; k < power.size(); ++k) {
    const double both_halves = k == 0 || k == size / 2 ? 1 : 2;
    power[k] = both_halves * std::norm(values[k]) / (static_cast<double>(size) * window_power);
  }
  return power;
}

TraceSurvey::TraceSurvey(std::size_t channels, std::int32_t bits) : bits_(bits), channels_(channels) {
  for (Channel& channel : channels_) {
    channel.histogram.assign(std::size_t{1} << 15, 0);
    channel.power.assign(spectrum_samples / 2 + 1, 0);
  }
}

void TraceSurvey::take(const TraceBlock& block) {
  for (std::size_t c = 0; c < channels_.size(); ++c) {
    const auto codes = block.codes.channel(c);
    for (const std::int16_t code : codes) ++channels_[c].histogram[static_cast<std::size_t>(code)];
    if (block.first_sample == 0) channels_[c].pending.clear();
    add_to_spectrum(channels_[c], codes);
  }
  samples_ += static_cast<std::int64_t>(block.codes.samples());
  traces_ += block.last_of_trace ? 1 : 0;
}

void TraceSurvey::add_to_spectrum(Channel& channel, std::span<const std::int16_t> codes) {
  for (const std::int16_t code : codes) {
    channel.pending.push_back(code);
    if (channel.pending.size() < spectrum_samples) continue;
    const double mean = mean_of(channel.pending);
    for (double& value : channel.pending) value -= mean;
    const auto power = power_spectrum(channel.pending);
    for (std::size_t k = 0; k < power.size(); ++k) channel.power[k] += power[k];
    ++channel.spectra;
    channel.pending.clear();
  }
}

ChannelDescription TraceSurvey::describe(const Channel& channel) const {
  ChannelDescription d;
  const auto& counts = channel.histogram;
  const auto first = std::find_if(counts.begin(), counts.end(), [](auto n) { return n > 0; });
  if (first == counts.end()) return d;
  d.smallest = static_cast<std::int32_t>(first - counts.begin());
  d.largest = static_cast<std::int32_t>(counts.rend() - std::find_if(counts.rbegin(), counts.rend(), [](auto n) { return n > 0; })) - 1;
  d.baseline = static_cast<std::int32_t>(std::max_element(counts.begin(), counts.end()) - counts.begin());
  double sum = 0, squares = 0, below = 0, below_squares = 0;
  for (std::int32_t code = d.smallest; code <= d.largest; ++code) {
    const auto n = static_cast<double>(counts[static_cast<std::size_t>(code)]);
    const double away = code - d.baseline;
    sum += n * away;
    squares += n * away * away;
    // The code of the baseline belongs half to each side of the mirror.
    if (code <= d.baseline) {
      below += code == d.baseline ? n / 2 : n;
      below_squares += n * away * away;
    }
  }
  const auto all = static_cast<double>(samples_);
  d.mean = d.baseline + sum / all;
  d.rms = std::sqrt(std::max(0.0, squares / all - (sum / all) * (sum / all)));
  d.noise_rms = below > 0 ? std::sqrt(below_squares / below) : 0;
  d.at_zero = counts[0];
  d.at_largest_code = counts[(std::size_t{1} << bits_) - 1];
  if (channel.spectra > 0) {
    for (const double power : channel.power) d.spectrum.push_back(power / static_cast<double>(channel.spectra));
  }
  return d;
}

TraceDescription TraceSurvey::description() const {
  TraceDescription description{traces_, samples_, {}};
  for (const Channel& channel : channels_) description.channels.push_back(describe(channel));
  return description;
}

}  // namespace cistern
