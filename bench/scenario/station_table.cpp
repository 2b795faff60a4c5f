#include "bench/scenario/tables.hpp"
#include "traces/base/time.hpp"

namespace cistern {
namespace {

/// Room for what a table says in other units until all of it is read.
struct StationKeys {
  CaptureConfig capture;
  double copy_out_us{20};
};

}  // namespace

Table station_table() {
  using K = StationKeys;
  const auto samples = [](std::int64_t CaptureConfig::*member, double low) {
    return [member, low](K& k, const toml::node& node, const KeyPlace& at) {
      k.capture.*member = read_integer(node, at, {low, 1e9});
    };
  };
  const std::vector<Key<K>> keys{
      {"pre_samples", "samples", "120", "whole, from 0 to 1000000000", "Kept before a firing.",
       samples(&CaptureConfig::pre_samples, 0)},
      {"post_samples", "samples", "480", "whole, from 1 to 1000000000",
       "Kept from the firing on, its own sample included.", samples(&CaptureConfig::post_samples, 1)},
      {"max_samples", "samples", "2400", "whole, from 1 to 1000000000",
       "Length of a buffer: the limit of overlap = \"extend\".", samples(&CaptureConfig::max_samples, 1)},
      {"capture_buffers", "", "4", "whole, from 1 to 1000", "Places to hold a capture.",
       [](K& k, const auto& node, const auto& at) {
         k.capture.buffers = static_cast<std::int32_t>(read_integer(node, at, {1, 1000}));
       }},
      {"copy_out_us", "us", "20", "from 0 to 1000000000",
       "Time to copy one capture of pre and post samples out, over one bus.",
       [](K& k, const auto& node, const auto& at) {
         k.copy_out_us = read_number(node, at, {0, 1e9});
       }},
      {"overlap", "", "ignore", "ignore, extend or new_buffer", "What a firing inside an open capture does.",
       [](K& k, const auto& node, const auto& at) {
         k.capture.overlap = *overlap_policy_named(read_text(node, at, {"ignore", "extend", "new_buffer"}));
       }}};
  Table table;
  table.name = "station";
  table.sentence = "Capture buffers and their copy-out: when a station is too busy for a firing.";
  table.keys = describe(keys);
  table.read = [keys](const ReadingContext& context, const toml::table& toml, const std::string& full_name,
                      Scenario& scenario) {
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
