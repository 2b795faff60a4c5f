/// The fast kernel and the margin meter against NumPy in its own process, written from the trigger
/// rules alone: firings, what stopped them, onsets, unknown starts, margins.
#include <fmt/format.h>
#include <gtest/gtest.h>

#include "firmware_model/trigger/kernel.hpp"
#include "firmware_model/trigger/margin.hpp"
#include "tests/cosim/numpy_reference.hpp"
#include "tests/cosim/random_triggers.hpp"
#include "tests/cosim/stimuli.hpp"
#include "tests/cosim/temporary_folder.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t kSeed = 20'260'102;
constexpr int kSettings = 200;
constexpr int kTraces = 3;
constexpr std::size_t kSamples = 2'000;

NumpyCase random_case(TriggerKind kind, int number) {
  RandomStream stream = case_stream(kSeed, kind, number);
  NumpyCase one;
  one.settings = random_trigger(kind, number % 8 == 7 ? 16 : 4, stream);
  one.settings.firing.enabled = !one_in(stream, 12);
  one.contiguous = one_in(stream, 3);
  for (int t = 0; t < kTraces; ++t) one.traces.push_back(boundary_trace(one.settings.condition, kSamples, stream));
  return one;
}

std::vector<NumpyFiring> kernel_firings(const NumpyCase& one) {
  TriggerKernel kernel(one.settings);
  std::vector<NumpyFiring> result;
  for (std::size_t t = 0; t < one.traces.size(); ++t) {
    if (!one.contiguous) kernel.reset();
    const std::int64_t start = one.contiguous ? static_cast<std::int64_t>(t * kSamples) : 0;
    std::vector<Firing> firings;
    kernel.process(one.traces[t].view(), firings);
    for (const Firing& firing : firings) {
      result.push_back({static_cast<std::int64_t>(t), firing.sample - start, firing.onset_sample - start,
                        std::string(name_of(firing.status)), firing.start_unknown});
    }
  }
  return result;
}

std::vector<NumpyMargin> meter_margins(const NumpyCase& one) {
  MarginMeter meter(one.settings.condition);
  std::vector<NumpyMargin> result;
  for (std::size_t t = 0; t < one.traces.size(); ++t) {
    if (!one.contiguous) meter.reset();
    meter.forget_best();
    const std::int64_t start = one.contiguous ? static_cast<std::int64_t>(t * kSamples) : 0;
    meter.process(one.traces[t].view());
    const auto best = meter.best();
    if (best) result.push_back({static_cast<std::int64_t>(t), best->sample - start, best->margin});
  }
  return result;
}

std::string text_of(const NumpyFiring& firing) {
  return fmt::format("trace {} sample {} onset {} {} start_unknown {}", firing.trace, firing.sample,
                     firing.onset_sample, firing.status, firing.start_unknown);
}

std::string text_of(const NumpyMargin& margin) {
  return fmt::format("trace {} sample {} margin {}", margin.trace, margin.sample, margin.margin);
}

/// Says where two tables part.
template <typename Row>
std::string first_difference(const std::vector<Row>& ours, const std::vector<Row>& theirs) {
  const auto [mine, other] = std::mismatch(ours.begin(), ours.end(), theirs.begin(), theirs.end());
  return fmt::format("ours: {}; NumPy: {}", mine == ours.end() ? "nothing more" : text_of(*mine),
                     other == theirs.end() ? "nothing more" : text_of(*other));
}

void compare_with_numpy(TriggerKind kind) {
  std::vector<NumpyCase> cases;
  for (int k = 0; k < kSettings; ++k) cases.push_back(random_case(kind, k));
  const TemporaryFolder folder;
  const std::vector<NumpyAnswer> answers = ask_numpy(cases, folder.path());
  std::size_t firings = 0;
  std::size_t margins = 0;
  for (std::size_t k = 0; k < cases.size(); ++k) {
    const std::vector<NumpyFiring> ours = kernel_firings(cases[k]);
    EXPECT_TRUE(ours == answers[k].firings)
        << "seed " << kSeed << ", setting " << k << ": " << first_difference(ours, answers[k].firings);
    firings += answers[k].firings.size();
    const std::vector<NumpyMargin> ours_margins = meter_margins(cases[k]);
    EXPECT_TRUE(ours_margins == answers[k].margins)
        << "seed " << kSeed << ", setting " << k << ": " << first_difference(ours_margins, answers[k].margins);
    margins += answers[k].margins.size();
  }
  fmt::print("{}: {} settings, {} firings, {} margins\n", name_of(kind), kSettings, firings, margins);
  EXPECT_GT(firings, 10'000U);
  EXPECT_EQ(margins, std::size_t{kSettings} * kTraces);
}

TEST(Numpy, threshold_firings_and_margins_are_those_of_the_kernel) { compare_with_numpy(TriggerKind::Threshold); }

TEST(Numpy, time_over_threshold_firings_and_margins_are_those_of_the_kernel) {
  compare_with_numpy(TriggerKind::TimeOverThreshold);
}

TEST(Numpy, boxcar_sum_firings_and_margins_are_those_of_the_kernel) { compare_with_numpy(TriggerKind::BoxcarSum); }

}  // namespace
}  // namespace cistern
