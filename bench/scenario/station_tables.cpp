/// \file
/// [digitizer], [calibration] and [station]: the electronics around the triggers.
#include "bench/scenario/tables.hpp"
#include "traces/base/time.hpp"

namespace cistern {
namespace {

using D = DigitizerConfig;

void refuse_tracker(D&, const toml::node&, const KeyPlace& at) { complain(at, "a baseline tracker is not in this version; expected baseline_counts"); }

/// Room for what a table says in other units until all of it is read.
struct StationKeys {
  CaptureConfig capture;
  double copy_out_us{20};
};

}  // namespace

Table digitizer_table() {
  struct DigitizerKeys {
    D config;
    double range_mv{2000};
  };
  using K = DigitizerKeys;
  const std::vector<Key<K>> keys{
      {"channels", "", "required", "whole, from 1 to 16", "Number of channels, one per tube.",
       [](K& k, const auto& node, const auto& at) { k.config.channels = static_cast<std::int32_t>(read_integer(node, at, {1, 16})); }},
      {"sample_rate_mhz", "MHz", "required", "from 0.001 to 10000", "Samples per microsecond and channel.",
       [](K& k, const auto& node, const auto& at) { k.config.sample_rate_mhz = read_number(node, at, {0.001, 10000}); }},
      {"bits", "", "required", "whole, from 4 to 15", "Codes are 0 to 2^bits - 1.",
       [](K& k, const auto& node, const auto& at) { k.config.bits = static_cast<std::int32_t>(read_integer(node, at, {4, 15})); }},
      {"baseline_counts", "counts", "none", "whole, from 0 to 32767; one, or one per channel", "The code of no signal. Without it the trace file must say it.",
       [](K& k, const auto& node, const auto& at) {
         for (const std::int64_t value : read_integers(node, at, {0, 32767})) k.config.baseline_counts.push_back(static_cast<std::int32_t>(value));
       }},
      {"baseline", "", "none", "a table", "Tracker settings: not in this version.",
       [](K& k, const auto& node, const auto& at) { refuse_tracker(k.config, node, at); }},
      {"gain", "", "1", "more than 0 and at most 1000; one, or one per channel", "Factor on the waveform before rounding.",
       [](K& k, const auto& node, const auto& at) { k.config.gain = read_numbers(node, at, {0, 1000, true}); }},
      {"latency_samples", "samples", "0", "whole, from 0 to 10000", "Pipeline: from the sampling instant to the code.",
       [](K& k, const auto& node, const auto& at) { k.config.latency_samples = static_cast<std::int32_t>(read_integer(node, at, {0, 10000})); }},
      {"range_mv", "mV", "2000", "more than 0 and at most 1000000", "Input range: 2^bits counts.",
       [](K& k, const auto& node, const auto& at) { k.range_mv = read_number(node, at, {0, 1e6, true}); }}};
  Table table;
  table.name = "digitizer";
  table.sentence = "The analogue-to-digital converters. Required.";
  table.keys = describe(keys);
  table.read = [keys](const ReadingContext& context, const toml::table& toml, const std::string& full_name, Scenario& scenario) {
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
      if (value > largest_code(digitizer)) complain(baseline, fmt::format("got {}, expected at most {}, the largest code of {} bits", value, largest_code(digitizer), digitizer.bits));
    }
  };
  return table;
}

Table calibration_table() {
  using C = CalibrationConfig;
  Table table = single_table<C>(
      "calibration", "Counts of one vertical equivalent muon, as `cistern traces calibrate` prints them.",
      {{"height_counts_per_vem", "counts", "none", "more than 0; one, or one per channel", "Pulse height, for level_vem.",
        [](C& c, const auto& node, const auto& at) { c.height_counts_per_vem = read_numbers(node, at, {0, 1e9, true}); }},
       {"area_counts_per_vem", "counts x samples", "none", "more than 0; one, or one per channel", "Pulse area, for sum_vem.",
        [](C& c, const auto& node, const auto& at) { c.area_counts_per_vem = read_numbers(node, at, {0, 1e12, true}); }}},
      [](Scenario& scenario) -> C& { return scenario.calibration; });
  table.check = [](const KeyPlace& at, Scenario& scenario) {
    for (auto* list : {&scenario.calibration.height_counts_per_vem, &scenario.calibration.area_counts_per_vem}) {
      if (!*list) continue;
      const bool is_height = list == &scenario.calibration.height_counts_per_vem;
      expect_per_channel({at.place, at.key + (is_height ? ".height_counts_per_vem" : ".area_counts_per_vem")}, **list, scenario.digitizer.channels);
      *list = spread_over_channels(**list, scenario.digitizer.channels);
    }
  };
  return table;
}

Table station_table() {
  using K = StationKeys;
  const auto samples = [](std::int64_t CaptureConfig::*member, double low) {
    return [member, low](K& k, const toml::node& node, const KeyPlace& at) { k.capture.*member = read_integer(node, at, {low, 1e9}); };
  };
  const std::vector<Key<K>> keys{
      {"pre_samples", "samples", "120", "whole, from 0 to 1000000000", "Kept before a firing.", samples(&CaptureConfig::pre_samples, 0)},
      {"post_samples", "samples", "480", "whole, from 1 to 1000000000", "Kept from the firing on, its own sample included.", samples(&CaptureConfig::post_samples, 1)},
      {"max_samples", "samples", "2400", "whole, from 1 to 1000000000", "Length of a buffer: the limit of overlap = \"extend\".", samples(&CaptureConfig::max_samples, 1)},
      {"capture_buffers", "", "4", "whole, from 1 to 1000", "Places to hold a capture.",
       [](K& k, const auto& node, const auto& at) { k.capture.buffers = static_cast<std::int32_t>(read_integer(node, at, {1, 1000})); }},
      {"copy_out_us", "us", "20", "from 0 to 1000000000", "Time to copy one capture of pre and post samples out, over one bus.",
       [](K& k, const auto& node, const auto& at) { k.copy_out_us = read_number(node, at, {0, 1e9}); }},
      {"overlap", "", "ignore", "ignore, extend or new_buffer", "What a firing inside an open capture does.",
       [](K& k, const auto& node, const auto& at) { k.capture.overlap = *overlap_policy_named(read_text(node, at, {"ignore", "extend", "new_buffer"})); }}};
  Table table;
  table.name = "station";
  table.sentence = "Capture buffers and their copy-out: when a station is too busy for a firing.";
  table.keys = describe(keys);
  table.read = [keys](const ReadingContext& context, const toml::table& toml, const std::string& full_name, Scenario& scenario) {
    K values;
    read_keys(context, keys, toml, full_name, values);
    scenario.has_station = true;
    scenario.capture = values.capture;
    scenario.capture.copy_out_samples = samples_in_ns(values.copy_out_us * 1000, scenario.digitizer.sample_rate_mhz);
  };
  table.check = [](const KeyPlace& at, Scenario& scenario) {
    if (const auto fault = fault_of(scenario.capture)) complain(at, *fault);
  };
  return table;
}

}  // namespace cistern
