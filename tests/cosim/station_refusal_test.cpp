/// \file
/// What the clocked station refuses, and what its processes throw.
#include <gtest/gtest.h>

#include <string>

#include "firmware_model/station/station_run.hpp"
#include "tests/cosim/own_process.hpp"
#include "tests/cosim/station_stimuli.hpp"
#include "traces/base/errors.hpp"

namespace cistern {
namespace {

/// The message of the InputError, or that there was none.
std::string refusal(const StationConfig& config, CodesView codes) {
  try {
    static_cast<void>(run_station(config, {threshold_trigger(100, 2)}, codes));
  } catch (const InputError& error) {
    return error.what();
  }
  return "accepted";
}

TEST(StationShell, throws_again_what_a_process_threw) {
  in_own_process([] {
    Codes codes = spikes(500, {});
    codes.channel(1)[77] = 4096;
    EXPECT_EQ(refusal(usual_config(), codes.view()), "sample 77 of channel 1: code 0 to 4095 expected, found 4096");
  });
  in_own_process([] {
    Codes codes = spikes(500, {});
    codes.channel(0)[0] = -1;
    EXPECT_EQ(refusal(usual_config(), codes.view()), "sample 0 of channel 0: code 0 to 4095 expected, found -1");
  });
}

TEST(StationShell, runs_at_most_100_days) {
  in_own_process([] {
    StationConfig config = usual_config();
    config.digitizer.latency_samples = 0;
    config.digitizer.sample_rate_mhz = 1e-12;  // a sample in 1e6 s; the last edge is that of sample n + 1
    EXPECT_EQ(refusal(config, spikes(8, {}).view()),
              "station: a run of at most 100 days expected, this one lasts 115.740741 days");
    EXPECT_EQ(refusal(config, spikes(7, {}).view()), "accepted");
  });
}

TEST(StationShell, refuses_a_configuration_out_of_range) {
  struct Row {
    const char* expected;
    void (*spoil)(StationConfig&);
  };
  const Row rows[] = {
      {"station: buffers: at least 1 expected", [](StationConfig& c) { c.capture.buffers = 0; }},
      {"station: ring_samples: at least pre_samples + 1 = 21 expected", [](StationConfig& c) { c.ring_samples = 20; }},
      {"digitizer: sample_rate_mhz: above 0 and at most 1000 expected",
       [](StationConfig& c) { c.digitizer.sample_rate_mhz = 1001; }},
      {"digitizer: sample_rate_mhz: above 0 and at most 1000 expected",
       [](StationConfig& c) { c.digitizer.sample_rate_mhz = 0; }},
      {"digitizer: latency_samples: at least 0 expected", [](StationConfig& c) { c.digitizer.latency_samples = -1; }},
  };
  for (const Row& row : rows) {
    StationConfig config = usual_config();
    row.spoil(config);
    EXPECT_EQ(refusal(config, spikes(10, {}).view()), row.expected);
  }
}

TEST(StationShell, refuses_a_second_run_in_one_process) {
  in_own_process([] {
    const Codes codes = spikes(10, {});
    EXPECT_EQ(refusal(usual_config(), codes.view()), "accepted");
    EXPECT_DEATH(refusal(usual_config(), codes.view()), "claimed");
  });
}

}  // namespace
}  // namespace cistern
