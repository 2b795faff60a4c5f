#include "bench/scenario/tables.hpp"

namespace cistern {
namespace {

using D = DigitizerConfig;

void refuse_tracker(D&, const toml::node&, const KeyPlace& at) {
  complain(at, "a baseline tracker is not in this version; expected baseline_counts");
}

}  // namespace

Table digitizer_table() {
  struct DigitizerKeys {
    D config;
    double range_mv{2000};
  };
  using K = DigitizerKeys;
  const std::vector<Key<K>> keys{
      {"channels", "", "required", "whole, from 1 to 16", "Number of channels, one per tube.",
       [](K& k, const auto& node, const auto& at) {
         k.config.channels = static_cast<std::int32_t>(read_integer(node, at, {1, 16}));
       }},
      {"sample_rate_mhz", "MHz", "required", "from 0.001 to 10000", "Samples per microsecond and channel.",
       [](K& k, const auto& node, const auto& at) {
         k.config.sample_rate_mhz = read_number(node, at, {0.001, 10000});
       }},
      {"bits", "", "required", "whole, from 4 to 15", "Codes are 0 to 2^bits - 1.",
       [](K& k, const auto& node, const auto& at) {
         k.config.bits = static_cast<std::int32_t>(read_integer(node, at, {4, 15}));
       }},
      {"baseline_counts", "counts", "none", "whole, from 0 to 32767; one, or one per channel",
       "The code of no signal. Without it the trace file must say it.",
       [](K& k, const auto& node, const auto& at) {
         for (const std::int64_t value : read_integers(node, at, {0, 32767}))
           k.config.baseline_counts.push_back(static_cast<std::int32_t>(value));
       }},
      {"baseline", "", "none", "a table", "Tracker settings: not in this version.",
       [](K& k, const auto& node, const auto& at) { refuse_tracker(k.config, node, at); }},
      {"gain", "", "1", "more than 0 and at most 1000; one, or one per channel",
       "Factor on the waveform before rounding.",
       [](K& k, const auto& node, const auto& at) {
         k.config.gain = read_numbers(node, at, {0, 1000, true});
       }},
      {"latency_samples", "samples", "0", "whole, from 0 to 10000", "Pipeline: from the sampling instant to the code.",
       [](K& k, const auto& node, const auto& at) {
         k.config.latency_samples = static_cast<std::int32_t>(read_integer(node, at, {0, 10000}));
       }},
      {"range_mv", "mV", "2000", "more than 0 and at most 1000000", "Input range: 2^bits counts.",
       [](K& k, const auto& node, const auto& at) {
         k.range_mv = read_number(node, at, {0, 1e6, true});
       }}};
  Table table;
  table.name = "digitizer";
  table.sentence = "The analogue-to-digital converters. Required.";
  table.keys = describe(keys);
  table.read = [keys](const ReadingContext& context, const toml::table& toml, const std::string& full_name,
                      Scenario& scenario) {
    K values;
    read_keys(context, keys, toml, full_name, values);
    scenario.digitizer = values.config;
    scenario.generator.sample_rate_mhz = values.config.sample_rate_mhz;
    scenario.generator.tank.tubes = values.config.channels;
    scenario.generator.frontend.counts_per_mv = static_cast<double>(1 << values.config.bits) / values.range_mv;
  };
  table.check = [](const KeyPlace& at, Scenario& scenario) {
    D& digitizer = scenario.digitizer;
    if (digitizer.gain.empty()) digitizer.gain = {1.0};
    expect_per_channel({at.place, at.key + ".gain"}, digitizer.gain, digitizer.channels);
    digitizer.gain = spread_over_channels(digitizer.gain, digitizer.channels);
    if (digitizer.baseline_counts.empty()) return;
    const KeyPlace baseline{at.place, at.key + ".baseline_counts"};
    expect_per_channel(baseline, digitizer.baseline_counts, digitizer.channels);
    digitizer.baseline_counts = spread_over_channels(digitizer.baseline_counts, digitizer.channels);
    for (const std::int32_t value : digitizer.baseline_counts) {
      if (value > largest_code(digitizer))
        complain(baseline, fmt::format("got {}, expected at most {}, the largest code of {} bits", value,
                                       largest_code(digitizer), digitizer.bits));
    }
  };
  return table;
}

}  // namespace cistern
