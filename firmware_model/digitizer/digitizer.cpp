#include "firmware_model/digitizer/digitizer.hpp"

#include <cstddef>
#include <span>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

struct Scale {
  float gain;
  float baseline_counts;
  float largest_code;
};

/// One contiguous run, without a branch, for the compiler to vectorize. Clipping first keeps the conversion to an
/// integer in range (a waveform that is not a number becomes 0). Truncation plus a comparison of the fraction, which
/// is exact, rounds half up everywhere; adding 0.5F would carry the float just below 0.5 up to 1.
void digitize_channel(std::span<const float> waveform, std::span<std::int16_t> codes, Scale scale) {
  const float* const from = waveform.data();
  std::int16_t* const to = codes.data();
  const std::size_t samples = codes.size();
  for (std::size_t s = 0; s < samples; ++s) {
    const float counts = from[s] * scale.gain + scale.baseline_counts;
    const float positive = counts > 0.0F ? counts : 0.0F;
    const float clipped = positive < scale.largest_code ? positive : scale.largest_code;
    const auto whole = static_cast<std::int32_t>(clipped);
    const float fraction = clipped - static_cast<float>(whole);
    to[s] = static_cast<std::int16_t>(whole + static_cast<std::int32_t>(fraction >= 0.5F));
  }
}

void assert_fits(const DigitizerConfig& config, const Waveform& waveform) {
  const auto channels = static_cast<std::size_t>(config.channels);
  CISTERN_ASSERT(config.bits >= 4 && config.bits <= 15);
  CISTERN_ASSERT(waveform.channels() == channels);
  CISTERN_ASSERT(config.baseline_counts.size() == channels);
  CISTERN_ASSERT(config.gain.empty() || config.gain.size() == channels);
}

}  // namespace

void digitize(const DigitizerConfig& config, const Waveform& waveform, Codes& codes) {
  assert_fits(config, waveform);
  codes.resize(waveform.channels(), waveform.samples());
  for (std::size_t c = 0; c < waveform.channels(); ++c) {
    const Scale scale{config.gain.empty() ? 1.0F : static_cast<float>(config.gain[c]),
                      static_cast<float>(config.baseline_counts[c]), static_cast<float>(largest_code(config))};
    digitize_channel(waveform.channel(c), codes.channel(c), scale);
  }
}

std::int64_t count_saturated(CodesView codes, std::int32_t bits) {
  const std::int32_t largest = (1 << bits) - 1;
  std::int64_t saturated = 0;
  for (std::size_t c = 0; c < codes.channels(); ++c) {
    for (const std::int16_t code : codes.channel(c)) saturated += code <= 0 || code >= largest;
  }
  return saturated;
}

}  // namespace cistern
