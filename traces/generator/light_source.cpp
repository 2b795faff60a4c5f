#include "traces/generator/light_source.hpp"

#include "traces/base/errors.hpp"
#include "traces/frontend/normal_table.hpp"
#include "traces/tank/cherenkov.hpp"
#include "traces/tank/light_decay.hpp"

namespace cistern {
namespace {

/// -ln of the smallest number that RandomStream::uniform gives is 37.4.
constexpr double largest_exponential = 38;
/// The normal table ends at 6.4 standard deviations.
constexpr double largest_normal = 6.5;
constexpr double rounding_samples = 1;

}  // namespace

TubeResponse::TubeResponse(const TankConfig& tank, const FrontendConfig& frontend, double sample_rate_mhz)
    : tubes_(tube_places(tank)),
      direct_fraction_(tank.direct_light_fraction),
      samples_per_ns_(sample_rate_mhz / 1000),
      light_decay_samples_(light_decay_time_ns(tank) * samples_per_ns_),
      transit_spread_samples_(frontend.transit_time_spread_ns * samples_per_ns_),
      pulse_(frontend, sample_rate_mhz),
      charge_(frontend.charge_spread) {
  CISTERN_ASSERT(direct_fraction_ >= 0 && direct_fraction_ < 1);
}

double TubeResponse::samples_before() const { return largest_normal * transit_spread_samples_ + rounding_samples; }

double TubeResponse::samples_after(double longest_track_m) const {
  // A direct photon crosses the water once at most, along no longer a way than the longest track.
  const double crossing_ns = longest_track_m * (1 + water_group_index) / light_speed_m_per_ns;
  return largest_exponential * light_decay_samples_ + largest_normal * transit_spread_samples_ +
         crossing_ns * samples_per_ns_ + static_cast<double>(pulse_.length()) + rounding_samples;
}

void TubeResponse::add_photo_electron(double time, RandomStream& stream, std::span<float> samples) const {
  const double transit = transit_spread_samples_ * static_cast<double>(normal_of(normal_table(), stream.next_word()));
  pulse_.add(time + transit, charge_.draw(stream), samples);
}

void TubeResponse::add(const LightSource& source, RandomStream& stream, Waveform& waveform) const {
  CISTERN_ASSERT(waveform.channels() == tubes_.size());
  const DirectLight direct(tubes_, source.track);
  const double diffuse_mean = source.photo_electrons * (1 - direct_fraction_) / static_cast<double>(tubes_.size());
  const double crossing_samples = source.track.length_m / light_speed_m_per_ns * samples_per_ns_;
  for (std::size_t tube = 0; tube < tubes_.size(); ++tube) {
    // Poisson numbers of given means are what remains when one Poisson total is shared over the tubes.
    const double direct_mean = source.photo_electrons * direct_fraction_ * direct.share(tube);
    const std::span<float> samples = waveform.channel(tube);
    for (std::uint32_t n = stream.poisson(direct_mean); n > 0; --n) {
      add_photo_electron(source.time + direct.draw_delay_ns(tube, stream) * samples_per_ns_, stream, samples);
    }
    for (std::uint32_t n = stream.poisson(diffuse_mean); n > 0; --n) {
      const double emission = crossing_samples * stream.uniform();
      add_photo_electron(source.time + emission + stream.exponential(light_decay_samples_), stream, samples);
    }
  }
}

}  // namespace cistern
