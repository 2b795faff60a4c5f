#include <algorithm>
#include <cmath>
#include <numeric>

#include "traces/base/errors.hpp"
#include "traces/generator/generator.hpp"

namespace cistern {
namespace {

// Long enough for the light of any tank of the allowed sizes to die out at 100 MHz.
constexpr std::size_t trace_samples = 4096;
constexpr std::int64_t onset_sample = 32;

struct Sums {
  double first{0};
  double second{0};

  void take(double value) {
    first += value;
    second += value * value;
  }
  [[nodiscard]] double mean(double n) const { return first / n; }
  [[nodiscard]] double standard_error(double n) const {
    return std::sqrt(std::max(0.0, second - first * first / n) / (n * (n - 1)));
  }
};

}  // namespace

VemCalibration calibrate(const TraceGenerator& generator, std::size_t channels, int muons) {
  CISTERN_ASSERT(muons >= 2);
  std::vector<Sums> heights(channels);
  std::vector<Sums> areas(channels);
  Waveform waveform;
  for (int i = 0; i < muons; ++i) {
    generator.make_vertical_muon(static_cast<std::uint64_t>(i), trace_samples, onset_sample, waveform);
    CISTERN_ASSERT(waveform.channels() == channels);
    for (std::size_t c = 0; c < channels; ++c) {
      const auto samples = waveform.channel(c);
      heights[c].take(*std::max_element(samples.begin(), samples.end()));
      areas[c].take(std::accumulate(samples.begin(), samples.end(), 0.0));
    }
  }
  VemCalibration vem;
  for (std::size_t c = 0; c < channels; ++c) {
    vem.height_counts.push_back(heights[c].mean(muons));
    vem.height_error.push_back(heights[c].standard_error(muons));
    vem.area_counts.push_back(areas[c].mean(muons));
    vem.area_error.push_back(areas[c].standard_error(muons));
  }
  return vem;
}

}  // namespace cistern
