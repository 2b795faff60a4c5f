/// \file
/// The clocked station against the pure parts it is made of: digitizer, kernel and book of captures.
#include <gtest/gtest.h>

#include <algorithm>
#include <string>
#include <vector>

#include "firmware_model/station/station_run.hpp"
#include "firmware_model/trigger/kernel.hpp"
#include "tests/cosim/own_process.hpp"
#include "tests/cosim/station_stimuli.hpp"
#include "traces/base/random.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t seed = 909;

/// Noise, and pulses with a sharp rise at random places.
Waveform random_waveform(std::size_t samples, double mean_gap_samples, RandomStream& stream) {
  Waveform waveform(2, samples);
  for (std::size_t c = 0; c < 2; ++c) {
    for (float& value : waveform.channel(c)) value = static_cast<float>(stream.normal());
  }
  for (double at = stream.exponential(mean_gap_samples); at < static_cast<double>(samples);
       at += stream.exponential(mean_gap_samples)) {
    const auto height = static_cast<float>(stream.exponential(60));
    const auto first = static_cast<std::size_t>(at);
    for (std::size_t s = first; s < std::min(samples, first + 4); ++s) {
      for (std::size_t c = 0; c < 2; ++c) waveform.channel(c)[s] += height;
    }
  }
  return waveform;
}

/// What kernels and book make of the codes: the station without clocks.
StationRun unclocked(const StationConfig& config, const std::vector<TriggerSettings>& triggers, CodesView codes) {
  StationRun run;
  for (std::size_t t = 0; t < triggers.size(); ++t) {
    TriggerKernel kernel(triggers[t]);
    std::vector<Firing> firings;
    kernel.process(codes, firings);
    for (const Firing& firing : firings) {
      StationFiring& added = run.firings.emplace_back();
      added.trigger = t;
      added.firing = firing;
    }
  }
  std::stable_sort(run.firings.begin(), run.firings.end(),
                   [](const StationFiring& a, const StationFiring& b) { return a.firing.sample < b.firing.sample; });
  CaptureBook book(config.capture);
  for (StationFiring& firing : run.firings) {
    if (firing.firing.status != FiringStatus::Passed) continue;
    const CaptureDecision decision = book.take(firing.firing.sample);
    firing.outcome = decision.outcome;
    firing.capture = decision.capture;
    if (decision.outcome == CaptureOutcome::NoFreeBuffer) firing.firing.status = FiringStatus::Busy;
  }
  for (const Capture& capture : book.captures()) run.captures.push_back({capture, true, {}});
  run.samples = static_cast<std::int64_t>(codes.samples());
  run.busy_samples = book.busy_samples(run.samples);
  return run;
}

void expect_same_codes(const StationCapture& capture, CodesView codes) {
  const auto first = static_cast<std::size_t>(capture.span.first_sample);
  const std::size_t end = std::min(codes.samples(), static_cast<std::size_t>(capture.span.end_sample));
  ASSERT_EQ(capture.codes.samples(), end - first);
  EXPECT_EQ(capture.complete, end == static_cast<std::size_t>(capture.span.end_sample));
  for (std::size_t c = 0; c < codes.channels(); ++c) {
    const auto expected = codes.channel(c).subspan(first, end - first);
    const auto got = capture.codes.channel(c);
    EXPECT_TRUE(std::equal(got.begin(), got.end(), expected.begin(), expected.end()));
  }
}

void expect_same(const StationRun& got, const StationRun& expected, const StationConfig& config, CodesView codes) {
  EXPECT_EQ(got.samples, expected.samples);
  EXPECT_EQ(got.busy_samples, expected.busy_samples);
  ASSERT_EQ(got.firings.size(), expected.firings.size());
  for (std::size_t n = 0; n < got.firings.size(); ++n) {
    const StationFiring& firing = got.firings[n];
    EXPECT_EQ(firing.trigger, expected.firings[n].trigger);
    EXPECT_EQ(firing.firing, expected.firings[n].firing) << firing.firing.sample;
    EXPECT_EQ(firing.outcome, expected.firings[n].outcome);
    EXPECT_EQ(firing.capture, expected.firings[n].capture);
    const double rate_mhz = config.digitizer.sample_rate_mhz;
    EXPECT_EQ(firing.time_ns, config.start_ns + sample_offset_ns(firing.firing.sample, rate_mhz));
    const std::int64_t decided = firing.firing.sample + decision_clocks(config.digitizer);
    EXPECT_EQ(firing.decided_ns, config.start_ns + sample_offset_ns(decided, rate_mhz));
  }
  ASSERT_EQ(got.captures.size(), expected.captures.size());
  for (std::size_t n = 0; n < got.captures.size(); ++n) {
    EXPECT_EQ(got.captures[n].span, expected.captures[n].span);
    expect_same_codes(got.captures[n], codes);
  }
}

TEST(StationShell, captures_what_the_pure_parts_say) {
  const auto run_case = [](std::uint64_t number) {
    RandomStream stream(seed, Purpose::PropertyTest, number);
    StationConfig config = usual_config();
    config.capture.overlap = static_cast<OverlapPolicy>(number % 3);
    config.capture.buffers = 1 + static_cast<std::int32_t>(number / 3 % 3);
    config.digitizer.latency_samples = static_cast<std::int32_t>(number % 4) * 5;
    std::vector<TriggerSettings> triggers = {threshold_trigger(40, 2), threshold_trigger(90, 1)};
    triggers[0].firing = {.hold_off_samples = 25, .prescale = 2};
    const Waveform waveform = random_waveform(60'000, 90, stream);
    Codes codes;
    digitize(config.digitizer, waveform, codes);
    const StationRun expected = unclocked(config, triggers, codes.view());
    EXPECT_GT(expected.busy_samples, 0);
    EXPECT_GT(expected.captures.size(), 100U);
    expect_same(run_station(config, triggers, waveform), expected, config, codes.view());
  };
  for (std::uint64_t number = 0; number < 12; ++number) {
    SCOPED_TRACE("seed " + std::to_string(seed) + " case " + std::to_string(number));
    in_own_process([&] { run_case(number); });
  }
}

TEST(StationShell, keeps_time_to_the_nanosecond_at_a_rate_of_uneven_periods) {
  in_own_process([] {
    const std::size_t last = 1'200'000;  // 10 ms at 120 MHz; periods rounded to 1 ps would be 400 ps off by then
    StationConfig config = usual_config();
    config.digitizer.latency_samples = 0;
    config.capture.copy_out_samples = 0;
    const Codes codes = spikes(last + 100, {1, 2 * last / 3, last});
    const StationRun run = run_station(config, {threshold_trigger(100, 2)}, codes.view());
    ASSERT_EQ(run.firings.size(), 3U);
    EXPECT_EQ(run.firings[0].time_ns - config.start_ns, 8);
    EXPECT_EQ(run.firings[0].decided_ns - config.start_ns, 25);
    EXPECT_EQ(run.firings[1].time_ns - config.start_ns, 6'666'667);
    EXPECT_EQ(run.firings[2].time_ns - config.start_ns, 10'000'000);
    EXPECT_EQ(run.firings[2].decided_ns - config.start_ns, 10'000'017);
  });
}

TEST(StationShell, hears_of_firings_in_the_first_and_in_the_last_sample) {
  in_own_process([] {
    const Codes codes = spikes(500, {0, 499});
    const StationRun run = run_station(usual_config(), {threshold_trigger(100, 2)}, codes.view());
    ASSERT_EQ(run.firings.size(), 2U);
    EXPECT_EQ(run.firings[0].firing.sample, 0);
    EXPECT_EQ(run.firings[1].firing.sample, 499);
    ASSERT_EQ(run.captures.size(), 2U);
    EXPECT_TRUE(run.captures[0].complete);
    EXPECT_FALSE(run.captures[1].complete);
    EXPECT_EQ(run.captures[1].codes.samples(), 21U);
  });
}

TEST(StationShell, captures_once_when_two_triggers_fire_in_one_sample) {
  in_own_process([] {
    const Codes codes = spikes(500, {100});
    const StationRun run =
        run_station(usual_config(), {threshold_trigger(100, 2), threshold_trigger(50, 1)}, codes.view());
    ASSERT_EQ(run.firings.size(), 2U);
    EXPECT_EQ(run.firings[0].outcome, CaptureOutcome::Captured);
    EXPECT_EQ(run.firings[1].outcome, CaptureOutcome::Merged);
    EXPECT_EQ(run.firings[1].capture, 0U);
    EXPECT_EQ(run.captures.size(), 1U);
  });
}

TEST(StationShell, marks_firings_without_a_buffer_as_busy) {
  in_own_process([] {
    StationConfig config = usual_config();
    config.capture.buffers = 1;
    const Codes codes = spikes(500, {100, 200, 309, 310});
    const StationRun run = run_station(config, {threshold_trigger(100, 2)}, codes.view());
    ASSERT_EQ(run.firings.size(), 3U) << "309 and 310 are one stretch over the level";
    EXPECT_EQ(run.firings[0].firing.status, FiringStatus::Passed);
    EXPECT_EQ(run.firings[1].firing.status, FiringStatus::Busy) << "free from 100 + 60 + 150 = 310";
    EXPECT_EQ(run.firings[2].firing.status, FiringStatus::Busy);
    EXPECT_EQ(run.busy_samples, 209);
  });
}

TEST(StationShell, runs_without_triggers_and_without_samples) {
  in_own_process([] {
    const StationRun run = run_station(usual_config(), {}, Codes(2, 0).view());
    EXPECT_EQ(run.samples, 0);
    EXPECT_TRUE(run.firings.empty());
  });
}

}  // namespace
}  // namespace cistern
