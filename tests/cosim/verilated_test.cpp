/// The fast kernel against Verilated Verilog that was written from the trigger rules alone: the
/// same firings with the same fate, sample by sample, on traces made to sit on the boundaries.
#include <fmt/format.h>
#include <gtest/gtest.h>

#include "firmware_model/trigger/kernel.hpp"
#include "tests/cosim/random_triggers.hpp"
#include "tests/cosim/stimuli.hpp"
#include "tests/cosim/verilated_probe.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t kSeed = 20'260'101;
constexpr int kSettings = 480;
constexpr std::size_t kSamples = 20'000;
constexpr std::int64_t kLeastFirings = 100'000;
constexpr std::int64_t kLeastNearMisses = 10'000;

/// The kernel's firings, the trace being handed over in blocks of random length.
std::vector<ProbeFiring> kernel_firings(const TriggerSettings& settings, const CodesView& codes, RandomStream& stream) {
  TriggerKernel kernel(settings);
  std::vector<Firing> firings;
  const std::int64_t longest = one_in(stream, 4) ? 40 : 9'000;
  for (std::size_t at = 0; at < codes.samples();) {
    const auto wanted = static_cast<std::size_t>(between(stream, 1, longest));
    const std::size_t count = std::min(wanted, codes.samples() - at);
    kernel.process(codes.part(at, count), firings);
    at += count;
  }
  std::vector<ProbeFiring> result;
  for (const Firing& firing : firings) result.push_back({firing.sample, firing.status});
  return result;
}

struct Totals {
  std::int64_t passed{0};
  std::int64_t stopped{0};
  NearMisses near_misses;

  void add(const ProbeRun& run) {
    for (const ProbeFiring& firing : run.firings) ++(firing.status == FiringStatus::Passed ? passed : stopped);
    near_misses.one_count += run.near_misses.one_count;
    near_misses.one_sample += run.near_misses.one_sample;
    near_misses.one_channel += run.near_misses.one_channel;
  }
};

/// Says where two lists of firings part.
std::string first_difference(const std::vector<ProbeFiring>& ours, const std::vector<ProbeFiring>& theirs) {
  const auto [mine, other] = std::mismatch(ours.begin(), ours.end(), theirs.begin(), theirs.end());
  const auto text = [](auto at, auto end) {
    return at == end ? std::string("nothing more") : fmt::format("{} at {}", name_of(at->status), at->sample);
  };
  return fmt::format("kernel: {}; Verilog: {}", text(mine, ours.end()), text(other, theirs.end()));
}

Totals compare_with_verilog(TriggerKind kind) {
  Totals totals;
  const auto narrow = make_probe(kind, 4);
  const auto wide = make_probe(kind, 16);
  for (int k = 0; k < kSettings; ++k) {
    RandomStream stream = case_stream(kSeed, kind, k);
    VerilatedProbe& probe = k % 8 == 7 ? *wide : *narrow;
    const TriggerSettings settings = random_trigger(kind, k % 8 == 7 ? 16 : 4, stream);
    const Codes codes = boundary_trace(settings.condition, kSamples, stream);
    probe.configure(settings);
    const ProbeRun run = probe.run(codes.view());
    const std::vector<ProbeFiring> ours = kernel_firings(settings, codes.view(), stream);
    EXPECT_TRUE(ours == run.firings) << "seed " << kSeed << ", setting " << k << ": "
                                     << first_difference(ours, run.firings);
    totals.add(run);
  }
  fmt::print(
      "{}: {} settings, {} clocks, {} firings passed, {} stopped; near misses by one count {}, one sample {}, "
      "one channel {}\n",
      name_of(kind), kSettings, kSettings * kSamples, totals.passed, totals.stopped, totals.near_misses.one_count,
      totals.near_misses.one_sample, totals.near_misses.one_channel);
  return totals;
}

TEST(Verilated, threshold_fires_as_the_kernel) {
  const Totals totals = compare_with_verilog(TriggerKind::Threshold);
  EXPECT_GE(totals.passed, kLeastFirings);
  EXPECT_GE(totals.near_misses.one_count, kLeastNearMisses);
  EXPECT_GE(totals.near_misses.one_channel, kLeastNearMisses);
}

TEST(Verilated, time_over_threshold_fires_as_the_kernel) {
  const Totals totals = compare_with_verilog(TriggerKind::TimeOverThreshold);
  EXPECT_GE(totals.passed, kLeastFirings);
  EXPECT_GE(totals.near_misses.one_count, kLeastNearMisses);
  EXPECT_GE(totals.near_misses.one_sample, kLeastNearMisses);
  EXPECT_GE(totals.near_misses.one_channel, kLeastNearMisses);
}

TEST(Verilated, boxcar_sum_fires_as_the_kernel) {
  const Totals totals = compare_with_verilog(TriggerKind::BoxcarSum);
  EXPECT_GE(totals.passed, kLeastFirings);
  EXPECT_GE(totals.near_misses.one_count, kLeastNearMisses);
  EXPECT_GE(totals.near_misses.one_channel, kLeastNearMisses);
}

}  // namespace
}  // namespace cistern
