/// \file
/// The joined generator against independent estimates.
#include <boost/math/quadrature/gauss_kronrod.hpp>
#include <cmath>
#include <numbers>
#include <numeric>
#include <vector>

#include "tests/reference/printed_check.hpp"
#include "traces/frontend/pulse_shape.hpp"
#include "traces/generator/generator.hpp"
#include "traces/particles/muon_flux.hpp"
#include "traces/tank/cylinder.hpp"
#include "traces/tank/light_decay.hpp"

namespace cistern {
namespace {

using std::numbers::pi;
constexpr std::uint64_t seed = 14;

/// Flux over all directions of the sky at the site, weighted by an area, from first principles.
template <typename Area>
double flux_times_area(const MuonConfig& config, Area area) {
  using Quadrature = boost::math::quadrature::gauss_kronrod<double, 61>;
  const auto of_direction = [&](double c) {
    const auto of_log_momentum = [&](double x) { return std::exp(x) * muon_intensity(config, std::exp(x), c); };
    return 2 * pi * area(c) *
           Quadrature::integrate(of_log_momentum, std::log(config.momentum_min_gev), std::log(muon_momentum_max_gev), 8,
                                 1e-7);
  };
  return Quadrature::integrate(of_direction, 0.0, 1.0, 8, 1e-7);
}

TEST(GeneratorReference, muon_rate_is_flux_times_area) {
  const GeneratorConfig config;
  const double r = config.tank.radius_m;
  const double h = config.tank.depth_m;
  const double expected =
      flux_times_area(config.muons, [&](double c) { return pi * r * r * c + 2 * r * h * std::sqrt(1 - c * c); });
  const double got = TraceGenerator(config, seed).muon_rate_hz();
  check_relative("flux times area, integrated", "muons through the demo tank, /s", expected, got, 1e-3);
  EXPECT_GT(got, 1000);  // an independent quick estimate for a tank of this size: one to two kHz
  EXPECT_LT(got, 2000);
}

TEST(GeneratorReference, mean_light_is_the_fluence_times_the_volume) {
  // Campbell 1909: the mean of many pulses is their rate times their area. Cauchy: rate times mean
  // chord is the omnidirectional fluence rate times the volume. Above 20 GeV/c every metre shines alike.
  GeneratorConfig config;
  config.frontend.noise_rms_mv = 0;
  config.muons.momentum_min_gev = 20;
  config.muons.flux_scale = 1000;
  const Cylinder water{config.tank.radius_m, config.tank.depth_m};
  const double path_per_s = flux_times_area(config.muons, [](double) { return 1.0; }) * water.volume_m3();
  const double area_per_m = config.tank.photo_electrons_per_vem_and_tube *
                            PulseShape(config.frontend, 100).area_counts() / config.tank.depth_m;
  const double expected = path_per_s * area_per_m / 100e6;
  const TraceGenerator generator(config, seed);
  constexpr std::int64_t stretch = 100'000;
  constexpr int stretches = 150;
  std::vector<double> means(stretches);
  Waveform waveform;
  for (int i = 0; i < stretches; ++i) {
    generator.make_background(0, i * stretch, stretch, waveform);
    for (std::size_t c = 0; c < 4; ++c)
      means[static_cast<std::size_t>(i)] +=
          std::accumulate(waveform.channel(c).begin(), waveform.channel(c).end(), 0.0) / stretch / 4;
  }
  const double mean = std::accumulate(means.begin(), means.end(), 0.0) / stretches;
  double squares = 0;
  for (const double x : means) squares += (x - mean) * (x - mean);
  const double error = std::sqrt(squares / (stretches - 1.0) / stretches);
  check_near("Campbell 1909, Cauchy 1850", "mean of a channel above 20 GeV/c, counts", expected, mean,
             4 * error + 1e-3 * expected);
  EXPECT_LT(error, 0.03 * expected);
}

/// Light of one trace on one channel, in photo-electrons of mean charge.
double light_of(const Waveform& waveform, std::size_t channel, double area_per_photo_electron) {
  const auto samples = waveform.channel(channel);
  return std::accumulate(samples.begin(), samples.end(), 0.0) / area_per_photo_electron;
}

TEST(GeneratorReference, vertical_muons_have_the_configured_photo_electrons_with_poisson_statistics) {
  GeneratorConfig config;
  config.frontend.charge_spread = 0;
  const TraceGenerator generator(config, seed);
  const double area = PulseShape(config.frontend, 100).area_counts();
  constexpr int muons = 4000;
  double sum = 0;
  double squares = 0;
  Waveform waveform;
  for (std::uint64_t i = 0; i < muons; ++i) {
    generator.make_vertical_muon(i, 1024, 50, waveform);
    const double light = light_of(waveform, 1, area);
    sum += light;
    squares += light * light;
  }
  const double mean = sum / muons;
  const double variance = squares / muons - mean * mean;
  check_near("configured", "mean photo-electrons of one VEM in one tube", 55, mean, 4 * std::sqrt(55.0 / muons));
  check_near("Poisson", "their variance", 55, variance, 4 * 55 * std::sqrt((2 + 1 / 55.0) / muons));
}

TEST(GeneratorReference, tail_of_the_mean_pulse_decays_as_the_light) {
  const GeneratorConfig config;
  const TraceGenerator generator(config, seed);
  constexpr int muons = 4000;
  constexpr std::int64_t onset = 50;
  // From 200 ns on the shaping (12 ns) and the direct light have died out.
  double early = 0;  // 200 to 300 ns
  double late = 0;   // 300 to 400 ns
  Waveform waveform;
  for (std::uint64_t i = 0; i < muons; ++i) {
    generator.make_vertical_muon(i, 200, onset, waveform);
    for (std::size_t c = 0; c < 4; ++c) {
      const auto samples = waveform.channel(c);
      early = std::accumulate(samples.begin() + onset + 20, samples.begin() + onset + 30, early);
      late = std::accumulate(samples.begin() + onset + 30, samples.begin() + onset + 40, late);
    }
  }
  const double per_photo_electron = PulseShape(config.frontend, 100).area_counts();
  const double relative_error = std::sqrt(1.1225 * per_photo_electron * (1 / early + 1 / late));
  const double tau_ns = light_decay_time_ns(config.tank);
  const double got_ns = 100 / std::log(early / late);
  check_near("tank size and walls", "decay time of the mean pulse's tail, ns", tau_ns, got_ns,
             4 * relative_error * tau_ns * tau_ns / 100);
}

TEST(GeneratorReference, test_signals_have_their_true_size_on_average) {
  GeneratorConfig config;
  config.frontend.noise_rms_mv = 0;
  const TraceGenerator generator(config, seed);
  const double area = PulseShape(config.frontend, 100).area_counts();
  for (const SignalKind kind : {SignalKind::Muon, SignalKind::Electromagnetic, SignalKind::Shower}) {
    constexpr int signals = 1500;
    double sum = 0;
    double squares = 0;
    Waveform waveform;
    for (std::uint64_t i = 0; i < signals; ++i) {
      generator.make_signal({kind, 3, 300}, i, 2048, 50, waveform);
      double light = 0;
      for (std::size_t c = 0; c < 4; ++c) light += light_of(waveform, c, area);
      sum += light;
      squares += light * light;
    }
    const double mean = sum / signals;
    const double error = std::sqrt((squares / signals - mean * mean) / signals);
    check_near("configured", fmt::format("photo-electrons of a 3 VEM {} signal", name_of(kind)), 660, mean, 4 * error);
    // Nothing but counting and charges: 660 (1 + 0.35^2).
    check_near("Poisson, charge spread", "their rms", std::sqrt(660 * 1.1225), error * std::sqrt(signals),
               4 * std::sqrt(660 * 1.1225 / (2 * signals)));
  }
}

}  // namespace
}  // namespace cistern
