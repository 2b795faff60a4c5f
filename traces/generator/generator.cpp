/// \file
/// Method: live time is cut into blocks of 4,096 samples. A block's muons come from streams of its
/// own, and so does its noise. Any stretch is the noise of its blocks plus the pulses of all blocks
/// whose light can reach it, added in the order of time blocks, so that each sample is the same sum
/// of the same floats however the live time is cut.
#include "traces/generator/generator.hpp"

#include <algorithm>
#include <array>
#include <cmath>

#include "traces/base/errors.hpp"
#include "traces/frontend/noise_source.hpp"
#include "traces/generator/light_source.hpp"
#include "traces/generator/test_signal.hpp"
#include "traces/particles/muon_sampler.hpp"
#include "traces/tank/cylinder.hpp"
#include "traces/tank/muon_in_water.hpp"

namespace cistern {
namespace {

// Stream indices of live time: station, channel and block in one word of 64 bits. 2^38 blocks are
// more than the 100 days that one simulation may span.
constexpr unsigned block_bits = 38;
constexpr unsigned channel_bits = 4;
constexpr unsigned station_bits = 64 - block_bits - channel_bits;

std::uint64_t live_index(std::uint32_t station, std::size_t channel, std::int64_t block) {
  CISTERN_ASSERT(station < (1U << station_bits) && channel < (1U << channel_bits));
  CISTERN_ASSERT(block >= 0 && block < (std::int64_t{1} << block_bits));
  return (std::uint64_t{station} << (block_bits + channel_bits)) | (std::uint64_t{channel} << block_bits) |
         static_cast<std::uint64_t>(block);
}

// The same for the noise of test signals: number, channel and block.
constexpr unsigned signal_block_bits = 12;

std::uint64_t signal_index(std::uint64_t number, std::size_t channel) {
  CISTERN_ASSERT(number < (std::uint64_t{1} << (64 - channel_bits - signal_block_bits)));
  return (number << (channel_bits + signal_block_bits)) | (std::uint64_t{channel} << signal_block_bits);
}

}  // namespace

std::string_view name_of(SignalKind kind) {
  constexpr std::array<std::string_view, 3> names{"muon", "electromagnetic", "shower"};
  return names.at(static_cast<std::size_t>(kind));
}

struct TraceGenerator::Model {
  Model(const GeneratorConfig& generator_config, std::uint64_t campaign_seed)
      : config(generator_config),
        seed(campaign_seed),
        water{config.tank.radius_m, config.tank.depth_m},
        muons(config.muons, [this](double cos_zenith) { return water.projected_area_m2(cos_zenith); }),
        tubes(config.tank, config.frontend, config.sample_rate_mhz),
        noise(config.frontend, campaign_seed),
        muons_per_block(muons.rate_hz() * noise_block / (config.sample_rate_mhz * 1e6)) {}

  [[nodiscard]] std::size_t channels() const { return static_cast<std::size_t>(config.tank.tubes); }

  /// Muons that enter during one block.
  void add_muons(std::uint32_t station, std::int64_t block, std::int64_t first_sample, Waveform& waveform) const {
    const std::uint64_t index = live_index(station, 0, block);
    RandomStream arrivals(seed, Purpose::MuonArrivals, index);
    std::uint32_t left = arrivals.poisson(muons_per_block);
    if (left == 0) return;
    RandomStream tracks(seed, Purpose::MuonTrack, index);
    RandomStream light(seed, Purpose::PhotoElectrons, index);
    const auto block_start = static_cast<double>(block * noise_block - first_sample);
    for (; left > 0; --left) {
      const double time = block_start + arrivals.uniform() * noise_block;
      tubes.add(light_of(muons.draw(tracks), tracks, time), light, waveform);
    }
  }

  [[nodiscard]] LightSource light_of(const Muon& muon, RandomStream& stream, double time) const {
    const Track track = draw_track(water, muon.cos_zenith, stream);
    const double light_path_m = muon_light.light_path_m(muon.momentum_gev, track.length_m);
    return {track, photo_electrons_per_vem(config.tank) * light_path_m / water.depth_m, time};
  }

  GeneratorConfig config;
  std::uint64_t seed;
  Cylinder water;
  MuonSampler muons;
  MuonInWater muon_light;
  TubeResponse tubes;
  NoiseSource noise;
  double muons_per_block;
};

TraceGenerator::TraceGenerator(const GeneratorConfig& config, std::uint64_t campaign_seed)
    : model_(std::make_unique<const Model>(config, campaign_seed)) {}

TraceGenerator::~TraceGenerator() = default;

void TraceGenerator::make_background(std::uint32_t station, std::int64_t first_sample, std::size_t samples,
                                     Waveform& waveform) const {
  CISTERN_ASSERT(first_sample >= 0);
  waveform.reset(model_->channels(), samples);
  if (samples == 0) return;
  for (std::size_t c = 0; c < model_->channels(); ++c) {
    model_->noise.write(Purpose::ElectronicNoise, live_index(station, c, 0), first_sample, waveform.channel(c));
  }
  const double longest_track_m = std::hypot(2 * model_->water.radius_m, model_->water.depth_m);
  const auto reach_after = static_cast<std::int64_t>(std::ceil(model_->tubes.samples_after(longest_track_m)));
  const auto reach_before = static_cast<std::int64_t>(std::ceil(model_->tubes.samples_before()));
  const std::int64_t first_block = std::max<std::int64_t>(0, first_sample - reach_after) / noise_block;
  const std::int64_t last_sample = first_sample + static_cast<std::int64_t>(samples) - 1;
  const std::int64_t last_block = (last_sample + reach_before) / noise_block;
  for (std::int64_t block = first_block; block <= last_block; ++block) {
    model_->add_muons(station, block, first_sample, waveform);
  }
}

double TraceGenerator::make_signal(const TestSignal& signal, std::uint64_t number, std::size_t samples,
                                   std::int64_t onset_sample, Waveform& waveform) const {
  CISTERN_ASSERT(samples < (std::size_t{1} << signal_block_bits) * noise_block);
  waveform.reset(model_->channels(), samples);
  for (std::size_t c = 0; c < model_->channels(); ++c) {
    model_->noise.write(Purpose::TestSignalNoise, signal_index(number, c), 0, waveform.channel(c));
  }
  RandomStream stream(model_->seed, Purpose::TestSignal, number);
  const double onset = static_cast<double>(onset_sample) + stream.uniform();
  double photo_electrons = 0;
  for (LightSource& source : draw_light_sources(signal, model_->config, stream)) {
    source.time += onset;
    model_->tubes.add(source, stream, waveform);
    photo_electrons += source.photo_electrons;
  }
  return photo_electrons;
}

void TraceGenerator::make_vertical_muon(std::uint64_t number, std::size_t samples, std::int64_t onset_sample,
                                        Waveform& waveform) const {
  waveform.reset(model_->channels(), samples);
  RandomStream stream(model_->seed, Purpose::Calibration, number);
  const double onset = static_cast<double>(onset_sample) + stream.uniform();
  const double photo_electrons = photo_electrons_per_vem(model_->config.tank);
  model_->tubes.add({vertical_central_track(model_->water), photo_electrons, onset}, stream, waveform);
}

double TraceGenerator::muon_rate_hz() const { return model_->muons.rate_hz(); }

}  // namespace cistern
