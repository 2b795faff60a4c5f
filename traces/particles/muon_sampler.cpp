/// \file
/// Method: the plane of cosine of zenith and logarithm of momentum is cut into cells so small that
/// the intensity hardly varies inside one (0.005 by about 0.04). A cell is drawn by inversion of the
/// cumulative table and a point uniformly inside it.
#include "traces/particles/muon_sampler.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>

#include "traces/base/errors.hpp"
#include "traces/particles/muon_flux.hpp"

namespace cistern {
namespace {

constexpr std::size_t cosine_cells = 200;
constexpr std::size_t momentum_cells = 256;
constexpr double cosine_step = 1.0 / cosine_cells;

}  // namespace

MuonSampler::MuonSampler(const MuonConfig& config, const std::function<double(double)>& projected_area_m2)
    : log_momentum_min_(std::log(config.momentum_min_gev)),
      log_momentum_step_((std::log(muon_momentum_max_gev) - log_momentum_min_) / momentum_cells) {
  CISTERN_ASSERT(config.momentum_min_gev > 0 && config.momentum_min_gev < muon_momentum_max_gev);
  cumulative_.reserve(cosine_cells * momentum_cells);
  for (std::size_t i = 0; i < cosine_cells; ++i) {
    const double cos_zenith = (static_cast<double>(i) + 0.5) * cosine_step;
    const double solid_angle_area = 2 * std::numbers::pi * cosine_step * projected_area_m2(cos_zenith);
    for (std::size_t k = 0; k < momentum_cells; ++k) {
      const double momentum = std::exp(log_momentum_min_ + (static_cast<double>(k) + 0.5) * log_momentum_step_);
      const double momentum_width = momentum * log_momentum_step_;
      rate_hz_ += solid_angle_area * momentum_width * muon_intensity(config, momentum, cos_zenith);
      cumulative_.push_back(rate_hz_);
    }
  }
  if (rate_hz_ <= 0) return;
  for (double& part : cumulative_) part /= rate_hz_;
}

Muon MuonSampler::draw(RandomStream& stream) const {
  CISTERN_ASSERT(rate_hz_ > 0);
  const auto found = std::upper_bound(cumulative_.begin(), cumulative_.end() - 1, stream.uniform());
  const auto cell = static_cast<std::size_t>(found - cumulative_.begin());
  const double cosine_place = static_cast<double>(cell / momentum_cells) + stream.uniform();
  const double momentum_place = static_cast<double>(cell % momentum_cells) + stream.uniform();
  return {std::exp(log_momentum_min_ + momentum_place * log_momentum_step_), cosine_place * cosine_step};
}

}  // namespace cistern
