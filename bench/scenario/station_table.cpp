/// \file
/// Lengths may be written in samples or in time; the capture buffers know samples alone.
#include <limits>

#include "bench/scenario/key_builders.hpp"
#include "bench/scenario/tables.hpp"
#include "traces/base/time.hpp"

namespace cistern {
namespace {

/// The largest length that capture buffers take (fault_of in firmware_model/station).
constexpr std::int64_t largest_length = std::numeric_limits<std::int32_t>::max();

/// Room for what a table says in other units until all of it is read.
struct StationKeys {
  CaptureConfig capture;
  std::optional<double> pre_ns;
  std::optional<double> post_ns;
  std::optional<std::int64_t> max_samples;
  double copy_out_us{20};
};
using K = StationKeys;

std::vector<Key<K>> station_keys() {
  const auto capture = [](auto member) {
    return [member](K & k) -> auto& { return k.capture.*member; };
  };
  constexpr auto largest = static_cast<double>(largest_length);
  return {integer_key<K>("pre_samples", "samples", from_config, {0, largest}, "Kept before a firing; or pre_ns.",
                         capture(&CaptureConfig::pre_samples)),
          number_key<K>("pre_ns", "ns", "none", {0, 1e9}, "The same in time, rounded half up.", &K::pre_ns),
          integer_key<K>("post_samples", "samples", from_config, {1, largest},
                         "Kept from the firing on, its own sample included; or post_ns.",
                         capture(&CaptureConfig::post_samples)),
          number_key<K>("post_ns", "ns", "none", {0, 1e9, true}, "The same in time, rounded half up.", &K::post_ns),
          integer_key<K>("max_samples", "samples", "4 x (pre + post)", {1, largest},
                         "Length of a buffer: the limit of overlap = \"extend\"; at least pre and post together.",
                         &K::max_samples),
          integer_key<K>("capture_buffers", "", from_config, {1, 1000}, "Places to hold a capture.",
                         capture(&CaptureConfig::buffers)),
          number_key<K>("copy_out_us", "us", from_config, {0, 1e9},
                        "Time to copy one capture of pre and post samples out, over one bus.", &K::copy_out_us),
          choice_key<K, OverlapPolicy>("overlap", from_config,
                                       {{"ignore", OverlapPolicy::Ignore},
                                        {"extend", OverlapPolicy::Extend},
                                        {"new_buffer", OverlapPolicy::NewBuffer}},
                                       "What a firing inside an open capture does.", capture(&CaptureConfig::overlap))};
}

std::int64_t samples_of(const TableView& at, const char* key, double ns, double rate_mhz, std::int64_t smallest) {
  const std::int64_t samples = samples_in_ns(ns, rate_mhz);
  if (samples < smallest || samples > largest_length) {
    complain(at.at(key),
             fmt::format("got {} samples at {} MHz, expected {} to {}", samples, rate_mhz, smallest, largest_length));
  }
  return samples;
}

void expect_one_of(const TableView& at, const char* samples_key, const char* time_key) {
  if (!at.table->contains(samples_key) || !at.table->contains(time_key)) return;
  complain({at.blame({samples_key, time_key}).place, at.full_name},
           fmt::format("got both of {} and {}, expected one of them", samples_key, time_key));
}

CaptureConfig capture_of(const TableView& at, const K& keys, double rate_mhz) {
  expect_one_of(at, "pre_samples", "pre_ns");
  expect_one_of(at, "post_samples", "post_ns");
  CaptureConfig capture = keys.capture;
  if (keys.pre_ns) capture.pre_samples = samples_of(at, "pre_ns", *keys.pre_ns, rate_mhz, 0);
  if (keys.post_ns) capture.post_samples = samples_of(at, "post_ns", *keys.post_ns, rate_mhz, 1);
  capture.copy_out_samples = samples_of(at, "copy_out_us", keys.copy_out_us * 1000, rate_mhz, 0);
  const std::int64_t needed = capture.pre_samples + capture.post_samples;
  capture.max_samples = keys.max_samples.value_or(std::min(4 * needed, largest_length));
  if (capture.max_samples < needed) {
    complain(at.blame({"max_samples", "pre_samples", "pre_ns", "post_samples", "post_ns"}),
             fmt::format("got {}, expected {} before and {} from the firing on to fit (samples, at most {})",
                         capture.max_samples, capture.pre_samples, capture.post_samples, largest_length));
  }
  return capture;
}

}  // namespace

Table station_table() {
  Table table;
  table.name = "station";
  table.sentence = "Capture buffers and their copy-out: when a station is too busy for a firing.";
  const auto keys = station_keys();
  table.keys = describe(keys);
  table.read = [keys](const ReadingContext& context, const toml::table& toml, const std::string& full_name,
                      Scenario& scenario) {
    K values;
    read_keys(context, keys, toml, full_name, values);
    scenario.has_station = true;
    scenario.capture = capture_of({context, &toml, full_name}, values, scenario.digitizer.sample_rate_mhz);
  };
  return table;
}

}  // namespace cistern
