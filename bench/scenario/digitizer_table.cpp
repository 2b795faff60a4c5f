#include "bench/scenario/key_builders.hpp"
#include "bench/scenario/tables.hpp"

namespace cistern {
namespace {

using D = DigitizerConfig;

/// The digitizer's own Config, and the input range, which the front end needs in another form.
struct DigitizerKeys : D {
  double range_mv{2000};
};
using K = DigitizerKeys;

std::vector<Key<K>> digitizer_keys() {
  return {integer_key<K>("channels", "", "required", {1, 16}, "Number of channels; with [tank], one for each tube.",
                         &K::channels),
          number_key<K>("sample_rate_mhz", "MHz", "required", {0.001, 10000}, "Samples per microsecond and channel.",
                        &K::sample_rate_mhz),
          integer_key<K>("bits", "", "required", {4, 15}, "Codes are 0 to 2^bits - 1.", &K::bits),
          channel_integers_key<K>("baseline_counts", "counts", "none", {0, 32767},
                                  "The code of no signal. Without it the trace file must say it.", &K::baseline_counts),
          {"baseline", "", "none", not_in_this_version, "Settings of a baseline tracker.",
           [](K&, const auto&, const auto& at) {
             complain(at, "a baseline tracker is not in this version; expected baseline_counts");
           }},
          channel_numbers_key<K>("gain", "", "1", {0, 1000, true}, "Factor on the waveform before rounding.", &K::gain),
          integer_key<K>("latency_samples", "samples", from_config, {0, 10000},
                         "Pipeline: from the sampling instant to the code.", &K::latency_samples),
          number_key<K>("range_mv", "mV", from_config, {0, 1e6, true}, "Input range: 2^bits counts.", &K::range_mv)};
}

void check_baselines(const TableView& at, const D& digitizer) {
  for (const std::int32_t value : digitizer.baseline_counts) {
    if (value <= largest_code(digitizer)) continue;
    complain(at.blame({"baseline_counts", "bits"}),
             fmt::format("got {}, expected at most {}, the largest code of {} bits (counts)", value,
                         largest_code(digitizer), digitizer.bits));
  }
}

}  // namespace

Table digitizer_table() {
  const auto keys = digitizer_keys();
  Table table;
  table.name = "digitizer";
  table.sentence = "The analogue-to-digital converters. Required.";
  table.keys = describe(keys);
  table.read = [keys](const ReadingContext& context, const toml::table& toml, const std::string& full_name,
                      Scenario& scenario) {
    K values;
    read_keys(context, keys, toml, full_name, values);
    scenario.digitizer = values;
    scenario.generator.sample_rate_mhz = values.sample_rate_mhz;
    scenario.generator.tank.tubes = values.channels;
    scenario.generator.frontend.counts_per_mv = static_cast<double>(1 << values.bits) / values.range_mv;
  };
  table.check = [](const TableView& at, Scenario& scenario) {
    D& digitizer = scenario.digitizer;
    if (digitizer.gain.empty()) digitizer.gain = {1.0};
    expect_per_channel(at.at("gain"), digitizer.gain, digitizer.channels);
    digitizer.gain = spread_over_channels(digitizer.gain, digitizer.channels);
    if (digitizer.baseline_counts.empty()) return;
    expect_per_channel(at.at("baseline_counts"), digitizer.baseline_counts, digitizer.channels);
    digitizer.baseline_counts = spread_over_channels(digitizer.baseline_counts, digitizer.channels);
    check_baselines(at, digitizer);
  };
  return table;
}

}  // namespace cistern
