#pragma once
/// \file
/// Draws the muons that cross a body, with the right rate, momenta and zenith angles.
#include <functional>
#include <vector>

#include "traces/base/random.hpp"
#include "traces/particles/muon_config.hpp"

namespace cistern {

struct Muon {
  double momentum_gev;
  double cos_zenith;  ///< 0 to 1; the azimuth is uniform and drawn with the track
};

/// Immutable once made.
class MuonSampler {
 public:
  /// \param projected_area_m2  the body's area seen from a direction of the given cosine of zenith;
  ///                           used during the call only
  MuonSampler(const MuonConfig& config, const std::function<double(double)>& projected_area_m2);

  /// Muons per second above the momentum limit that cross the body.
  [[nodiscard]] double rate_hz() const noexcept { return rate_hz_; }
  /// Only where rate_hz() > 0.
  [[nodiscard]] Muon draw(RandomStream& stream) const;

 private:
  double log_momentum_min_;
  double log_momentum_step_;
  std::vector<double> cumulative_;  ///< over the cells of (cos zenith, log momentum), the last is 1
  double rate_hz_{0};
};

}  // namespace cistern
