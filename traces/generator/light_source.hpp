#pragma once
/// \file
/// Something that shines in the water, and how its light becomes pulses.
#include <vector>

#include "traces/base/random.hpp"
#include "traces/frontend/frontend_config.hpp"
#include "traces/frontend/pulse_shape.hpp"
#include "traces/tank/light_sharing.hpp"
#include "traces/tank/tank_config.hpp"
#include "traces/waveform/waveform.hpp"

namespace cistern {

/// One particle's (or one deposit's) light.
struct LightSource {
  Track track;
  double photo_electrons;  ///< mean number, all tubes together
  double time;             ///< when the particle enters, in samples from the waveform's first
};

/// Turns light into pulses on all channels. Immutable once made.
class TubeResponse {
 public:
  TubeResponse(const TankConfig& tank, const FrontendConfig& frontend, double sample_rate_mhz);

  /// Adds the light's pulses. What is drawn does not depend on the waveform's length.
  void add(const LightSource& source, RandomStream& stream, Waveform& waveform) const;

  /// No pulse starts earlier than this before the particle enters, nor touches a sample later than
  /// this after it. \param longest_track_m  of the sources
  [[nodiscard]] double samples_before() const;
  [[nodiscard]] double samples_after(double longest_track_m) const;

 private:
  void add_photo_electron(double time, RandomStream& stream, std::span<float> samples) const;
  std::vector<Vector3> tubes_;
  double direct_fraction_;
  double samples_per_ns_;
  double light_decay_samples_;
  double transit_spread_samples_;
  PulseShape pulse_;
  ChargeSpread charge_;
};

}  // namespace cistern
