/// \file
/// Method: the arrival times of particles are exponential, whose 10-to-90 % width is ln 9 times its
/// mean. When the earliest of such times is taken as zero, the others are again exponential with the
/// same mean (it has no memory), so that one particle is put at zero and the rest is drawn.
#include "traces/generator/test_signal.hpp"

#include <algorithm>
#include <cmath>

#include "traces/base/errors.hpp"
#include "traces/base/rounding.hpp"
#include "traces/tank/cherenkov.hpp"

namespace cistern {
namespace {

/// Size of one electromagnetic deposit. A soft electron or photon has some ten MeV where a vertical
/// muon leaves 2 MeV cm^2/g times the depth, some hundred MeV. Assumed; what matters is many and small.
constexpr double deposit_vem = 0.05;
/// Share of a shower-like signal's size that muons bring. Assumed.
constexpr double shower_muon_share = 0.5;
/// Deposits end within a few radiation lengths of water, 36.08 cm (Particle Data Group).
constexpr double radiation_length_m = 0.3608;

std::int64_t count_of(double size_vem, double each_vem) {
  return std::max<std::int64_t>(1, round_half_up(size_vem / each_vem));
}

class Particles {
 public:
  Particles(const GeneratorConfig& config, RandomStream& stream)
      : water_{config.tank.radius_m, config.tank.depth_m},
        per_vem_(photo_electrons_per_vem(config.tank)),
        stream_(stream) {}

  void add_muons(double size_vem) {
    const std::int64_t count = count_of(size_vem, 1);
    for (std::int64_t i = 0; i < count; ++i) add(draw_vertical_track(water_, stream_), size_vem, count);
  }

  void add_deposits(double size_vem) {
    const std::int64_t count = count_of(size_vem, deposit_vem);
    for (std::int64_t i = 0; i < count; ++i) {
      Track track = draw_vertical_track(water_, stream_);
      track.length_m = std::min(water_.depth_m, stream_.exponential(radiation_length_m));
      add(track, size_vem, count);
    }
  }

  /// One particle comes first; which one is drawn, since muons are listed before deposits.
  std::vector<LightSource> take_spread(double mean_delay_samples) {
    const auto size = static_cast<double>(sources_.size());
    const auto first = static_cast<std::size_t>(stream_.uniform() * size);
    for (std::size_t i = 0; i < sources_.size(); ++i) {
      if (i != first) sources_[i].time = mean_delay_samples > 0 ? stream_.exponential(mean_delay_samples) : 0;
    }
    return std::move(sources_);
  }

 private:
  void add(const Track& track, double size_vem, std::int64_t count) {
    sources_.push_back({track, size_vem * per_vem_ / static_cast<double>(count), 0});
  }
  Cylinder water_;
  double per_vem_;
  RandomStream& stream_;
  std::vector<LightSource> sources_;
};

}  // namespace

double photo_electrons_per_vem(const TankConfig& tank) { return tank.photo_electrons_per_vem_and_tube * tank.tubes; }

std::vector<LightSource> draw_light_sources(const TestSignal& signal, const GeneratorConfig& config,
                                            RandomStream& stream) {
  CISTERN_ASSERT(signal.size_vem > 0 && signal.spread_ns >= 0);
  Particles particles(config, stream);
  switch (signal.kind) {
    case SignalKind::Muon: particles.add_muons(signal.size_vem); break;
    case SignalKind::Electromagnetic: particles.add_deposits(signal.size_vem); break;
    case SignalKind::Shower:
      particles.add_muons(shower_muon_share * signal.size_vem);
      particles.add_deposits((1 - shower_muon_share) * signal.size_vem);
      break;
  }
  const double mean_delay_ns = signal.spread_ns / std::log(9.0);
  return particles.take_spread(mean_delay_ns * config.sample_rate_mhz / 1000);
}

}  // namespace cistern
