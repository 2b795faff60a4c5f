/// The fast kernel against the plain-port Verilog in an event-driven simulator: a million clocks
/// per kind of trigger, compared clock by clock by the bench itself.
#include <fmt/format.h>
#include <gtest/gtest.h>

#include "firmware_model/trigger/kernel.hpp"
#include "tests/cosim/icarus_bench.hpp"
#include "tests/cosim/random_triggers.hpp"
#include "tests/cosim/stimuli.hpp"
#include "tests/cosim/temporary_folder.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t kSeed = 20'260'103;
constexpr int kSettings = 8;
constexpr std::size_t kSamples = 125'000;

struct KernelRun {
  TriggerSettings settings;
  Codes codes;
  std::vector<Firing> firings;
};

KernelRun run_kernel(TriggerKind kind, int number, std::size_t samples) {
  RandomStream stream = case_stream(kSeed, kind, number);
  KernelRun run;
  run.settings = random_trigger(kind, 4, stream);
  run.codes = boundary_trace(run.settings.condition, samples, stream);
  TriggerKernel(run.settings).process(run.codes.view(), run.firings);
  return run;
}

void compare_with_icarus(TriggerKind kind) {
  IcarusTotals all;
  for (int k = 0; k < kSettings; ++k) {
    const KernelRun run = run_kernel(kind, k, kSamples);
    const TemporaryFolder folder;
    const IcarusTotals totals = run_in_icarus(run.settings, run.codes.view(), run.firings, folder.path());
    EXPECT_EQ(totals.differences, 0) << "seed " << kSeed << ", setting " << k;
    all.clocks += totals.clocks;
    all.firings += totals.firings;
  }
  fmt::print("{}: {} settings, {} clocks, {} firings\n", name_of(kind), kSettings, all.clocks, all.firings);
  EXPECT_GE(all.clocks, 1'000'000);
  EXPECT_GE(all.firings, 5'000);
}

TEST(Icarus, threshold_fires_as_the_kernel) { compare_with_icarus(TriggerKind::Threshold); }
TEST(Icarus, time_over_threshold_fires_as_the_kernel) { compare_with_icarus(TriggerKind::TimeOverThreshold); }
TEST(Icarus, boxcar_sum_fires_as_the_kernel) { compare_with_icarus(TriggerKind::BoxcarSum); }

TEST(Icarus, the_bench_notices_one_firing_that_is_a_sample_late) {
  KernelRun run = run_kernel(TriggerKind::Threshold, 0, 2'000);
  ASSERT_FALSE(run.firings.empty());
  run.firings.back().sample += 1;
  const TemporaryFolder folder;
  EXPECT_EQ(run_in_icarus(run.settings, run.codes.view(), run.firings, folder.path()).differences, 2);
}

}  // namespace
}  // namespace cistern
