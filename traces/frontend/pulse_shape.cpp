#include "traces/frontend/pulse_shape.hpp"

#include <algorithm>
#include <boost/math/distributions/gamma.hpp>
#include <cmath>
#include <numeric>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

constexpr std::int64_t phases = 16;
constexpr int integrations = 2;
/// Where the pulse is given up: e^-18 18^2 is 1e-5 of its peak.
constexpr double end_in_shaping_times = 18;

}  // namespace

double shaped_pulse(double time_ns, double shaping_time_ns, int integrations_count) {
  if (time_ns <= 0) return 0;
  const double x = time_ns / shaping_time_ns;
  return std::pow(x, integrations_count) * std::exp(-x);
}

PulseShape::PulseShape(const FrontendConfig& config, double sample_rate_mhz) {
  CISTERN_ASSERT(sample_rate_mhz > 0 && config.shaping_time_ns > 0);
  const double sample_ns = 1000 / sample_rate_mhz;
  const double peak = shaped_pulse(integrations * config.shaping_time_ns, config.shaping_time_ns, integrations);
  const double scale = config.pulse_height_mv * config.counts_per_mv / peak;
  length_ = static_cast<std::size_t>(std::ceil(end_in_shaping_times * config.shaping_time_ns / sample_ns)) + 2;
  for (std::int64_t phase = 0; phase < phases; ++phase) {
    for (std::size_t i = 0; i < length_; ++i) {
      const double samples_after = static_cast<double>(i) - static_cast<double>(phase) / phases;
      counts_.push_back(
          static_cast<float>(scale * shaped_pulse(samples_after * sample_ns, config.shaping_time_ns, integrations)));
    }
  }
}

double PulseShape::area_counts() const { return std::accumulate(counts_.begin(), counts_.end(), 0.0) / phases; }

void PulseShape::add(double time, float charge, std::span<float> samples) const {
  const auto step = static_cast<std::int64_t>(std::floor(time * phases + 0.5));
  const std::int64_t start = step >> 4;  // floor of a division by the phases
  const auto phase = static_cast<std::size_t>(step & (phases - 1));
  const auto first = std::max<std::int64_t>(0, -start);
  const auto last =
      std::min<std::int64_t>(static_cast<std::int64_t>(length_), static_cast<std::int64_t>(samples.size()) - start);
  const float* const shape = counts_.data() + phase * length_;
  float* const to = samples.data();
  for (std::int64_t i = first; i < last; ++i) to[start + i] += charge * shape[i];
}

ChargeSpread::ChargeSpread(double relative_rms) : charges_(std::size_t{1} << bits, 1.0F) {
  CISTERN_ASSERT(relative_rms >= 0 && relative_rms <= 1);
  if (relative_rms <= 1e-3) return;  // too narrow to matter, and hard on the quantiles
  const double shape = 1 / (relative_rms * relative_rms);
  const boost::math::gamma_distribution<> of_charge(shape, 1 / shape);
  // The mean of a slice follows from the distribution of the next higher shape, so that the means
  // of all slices average to 1.
  const boost::math::gamma_distribution<> of_moment(shape + 1, 1 / shape);
  const auto slices = static_cast<double>(charges_.size());
  double below = 0;
  for (std::size_t i = 0; i < charges_.size(); ++i) {
    const bool is_last = i + 1 == charges_.size();
    const double up_to = is_last ? 1 : cdf(of_moment, quantile(of_charge, (static_cast<double>(i) + 1) / slices));
    charges_[i] = static_cast<float>((up_to - below) * slices);
    below = up_to;
  }
}

}  // namespace cistern
