#include "tests/cosim/station_stimuli.hpp"

#include <algorithm>
#include <string>

namespace cistern {

TriggerSettings threshold_trigger(std::int32_t level_counts, std::int32_t majority) {
  TriggerSettings settings;
  settings.name = "level_" + std::to_string(level_counts);
  settings.condition = {.kind = TriggerKind::Threshold,
                        .baseline_counts = {200, 210},
                        .channel_enabled = {true, true},
                        .level_counts = {level_counts, level_counts},
                        .sum_counts = {0, 0},
                        .majority = majority};
  return settings;
}

StationConfig usual_config() {
  StationConfig config;
  config.digitizer = {.channels = 2,
                      .sample_rate_mhz = 120,
                      .bits = 12,
                      .baseline_counts = {200, 210},
                      .gain = {1.0, 1.5},
                      .latency_samples = 7};
  config.capture = {.pre_samples = 20, .post_samples = 60, .buffers = 2, .copy_out_samples = 150, .max_samples = 140};
  config.ring_samples = 21;
  config.start_ns = 1'400'000'000'000'000'000;
  return config;
}

Codes spikes(std::size_t samples, const std::vector<std::size_t>& places) {
  Codes codes(2, samples);
  std::fill(codes.channel(0).begin(), codes.channel(0).end(), std::int16_t{200});
  std::fill(codes.channel(1).begin(), codes.channel(1).end(), std::int16_t{210});
  for (const std::size_t place : places) {
    for (std::size_t c = 0; c < 2; ++c) codes.channel(c)[place] = 1000;
  }
  return codes;
}

}  // namespace cistern
