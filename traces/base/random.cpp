#include "traces/base/random.hpp"

#include <Random123/philox.h>

#include <cmath>
#include <numbers>

#include "traces/base/errors.hpp"

namespace cistern {

std::array<std::uint32_t, 4> philox4x32_10(std::array<std::uint32_t, 4> counter, std::array<std::uint32_t, 2> key) {
  const r123::Philox4x32_R<10>::ctr_type c{{counter[0], counter[1], counter[2], counter[3]}};
  const r123::Philox4x32_R<10>::key_type k{{key[0], key[1]}};
  const auto out = r123::Philox4x32_R<10>{}(c, k);
  return {out[0], out[1], out[2], out[3]};
}

RandomStream::RandomStream(std::uint64_t campaign_seed, Purpose purpose, std::uint64_t index)
    : counter_{0, static_cast<std::uint32_t>(index), static_cast<std::uint32_t>(index >> 32),
               static_cast<std::uint32_t>(purpose)},
      key_{static_cast<std::uint32_t>(campaign_seed), static_cast<std::uint32_t>(campaign_seed >> 32)} {}

std::uint32_t RandomStream::next_word() {
  if (next_ == words_.size()) {
    words_ = philox4x32_10(counter_, key_);
    ++counter_[0];
    CISTERN_ASSERT(counter_[0] != 0);  // 2^34 words from one stream: the index is too coarse
    next_ = 0;
  }
  return words_[next_++];
}

double RandomStream::uniform() {
  const std::uint64_t high = next_word() >> 5;  // 27 bits
  const std::uint64_t low = next_word() >> 6;   // 26 bits
  return (static_cast<double>((high << 26) | low) + 0.5) * 0x1p-53;
}

double RandomStream::uniform(double low, double high) { return low + (high - low) * uniform(); }

double RandomStream::exponential(double mean) { return -mean * std::log(uniform()); }

double RandomStream::normal() {
  // Box and Muller 1958. The second value is not kept: a stream is a plain sequence of words.
  const double radius = std::sqrt(-2.0 * std::log(uniform()));
  return radius * std::cos(2.0 * std::numbers::pi * uniform());
}

namespace {
std::uint32_t poisson_by_inversion(RandomStream& stream, double mean) {
  double rest = stream.uniform();
  double term = std::exp(-mean);
  std::uint32_t n = 0;
  while (rest > term && n < 1000) {
    rest -= term;
    ++n;
    term *= mean / n;
  }
  return n;
}

// W. Hoermann, "The transformed rejection method for generating Poisson random variables",
// Insurance: Mathematics and Economics 12 (1993), algorithm PTRS. Valid for mean >= 10.
std::uint32_t poisson_by_rejection(RandomStream& stream, double mean) {
  const double b = 0.931 + 2.53 * std::sqrt(mean);
  const double a = -0.059 + 0.02483 * b;
  const double inverse_alpha = 1.1239 + 1.1328 / (b - 3.4);
  const double v_r = 0.9277 - 3.6224 / (b - 2.0);
  for (;;) {
    const double u = stream.uniform() - 0.5;
    const double v = stream.uniform();
    const double us = 0.5 - std::abs(u);
    const double k = std::floor((2.0 * a / us + b) * u + mean + 0.43);
    if (us >= 0.07 && v <= v_r) return static_cast<std::uint32_t>(k);
    if (k < 0 || (us < 0.013 && v > us)) continue;
    const double left = std::log(v * inverse_alpha / (a / (us * us) + b));
    if (left <= k * std::log(mean) - mean - std::lgamma(k + 1.0)) return static_cast<std::uint32_t>(k);
  }
}
}  // namespace

std::uint32_t RandomStream::poisson(double mean) {
  CISTERN_ASSERT(mean >= 0 && mean < 1e9);
  return mean < 30 ? poisson_by_inversion(*this, mean) : poisson_by_rejection(*this, mean);
}

}  // namespace cistern
