#include "traces/files/spectrum.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>
#include <numeric>
#include <utility>

#include "traces/base/errors.hpp"

namespace cistern {

Periodogram::Periodogram(std::size_t size)
    : window_(size), cosines_(size / 2), sines_(size / 2), real_(size), imaginary_(size) {
  CISTERN_ASSERT(size >= 4 && (size & (size - 1)) == 0);
  const double turn = 2 * std::numbers::pi / static_cast<double>(size);
  for (std::size_t n = 0; n < size; ++n) window_[n] = 0.5 - 0.5 * std::cos(turn * static_cast<double>(n));
  for (std::size_t k = 0; k < size / 2; ++k) {
    cosines_[k] = std::cos(turn * static_cast<double>(k));
    sines_[k] = std::sin(turn * static_cast<double>(k));
  }
  window_power_ = std::inner_product(window_.begin(), window_.end(), window_.begin(), 0.0);
}

void Periodogram::add(std::span<const std::int16_t> segment, std::span<double> power) {
  CISTERN_ASSERT(segment.size() == size() && power.size() == size() / 2 + 1);
  const auto sum = std::accumulate(segment.begin(), segment.end(), std::int64_t{0});
  const double mean = static_cast<double>(sum) / static_cast<double>(size());
  for (std::size_t n = 0; n < size(); ++n) real_[n] = (segment[n] - mean) * window_[n];
  add_windowed(power);
}

std::vector<double> Periodogram::power_of(std::span<const double> segment) {
  CISTERN_ASSERT(segment.size() == size());
  for (std::size_t n = 0; n < size(); ++n) real_[n] = segment[n] * window_[n];
  std::vector<double> power(size() / 2 + 1);
  add_windowed(power);
  return power;
}

void Periodogram::add_windowed(std::span<double> power) {
  std::fill(imaginary_.begin(), imaginary_.end(), 0.0);
  transform();
  const double scale = 1 / (static_cast<double>(size()) * window_power_);
  for (std::size_t k = 0; k < power.size(); ++k) {
    const double halves = k == 0 || k == size() / 2 ? 1 : 2;
    power[k] += halves * scale * (real_[k] * real_[k] + imaginary_[k] * imaginary_[k]);
  }
}

/// Radix 2 in place (Cooley and Tukey 1965): bits of the index reversed, then butterflies.
void Periodogram::transform() {
  const std::size_t n = size();
  for (std::size_t i = 1, j = 0; i < n; ++i) {
    std::size_t bit = n >> 1;
    for (; (j & bit) != 0; bit >>= 1) j ^= bit;
    j ^= bit;
    if (i >= j) continue;
    std::swap(real_[i], real_[j]);
    std::swap(imaginary_[i], imaginary_[j]);
  }
  for (std::size_t half = 1; half < n; half *= 2) {
    const std::size_t stride = n / (2 * half);
    for (std::size_t start = 0; start < n; start += 2 * half) {
      for (std::size_t i = 0; i < half; ++i) {
        const std::size_t a = start + i;
        const std::size_t b = a + half;
        const double c = cosines_[i * stride];
        const double s = sines_[i * stride];
        const double real = real_[b] * c + imaginary_[b] * s;
        const double imaginary = imaginary_[b] * c - real_[b] * s;
        real_[b] = real_[a] - real;
        imaginary_[b] = imaginary_[a] - imaginary;
        real_[a] += real;
        imaginary_[a] += imaginary;
      }
    }
  }
}

}  // namespace cistern
