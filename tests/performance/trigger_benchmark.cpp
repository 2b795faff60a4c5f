/// \file
/// How fast the trigger kernels run, beside the plain sequential read of the same memory. Four channels;
/// a clock is one sample of all of them, 8 bytes.
#include <fmt/core.h>

#include <memory>

#include "firmware_model/trigger/block_scans.hpp"
#include "firmware_model/trigger/kernel.hpp"
#include "firmware_model/trigger/margin.hpp"
#include "firmware_model/trigger/specification.hpp"
#include "tests/performance/benchmark_traces.hpp"
#include "tests/performance/speed_table.hpp"
#include "traces/base/errors.hpp"

namespace cistern {
namespace {

constexpr std::size_t blocks_in_memory = 2'048;  // 256 MB, far more than any cache
constexpr std::size_t blocks_when_busy = 256;    // 32 MB: there the bits cost more than the reading
constexpr int passes_in_cache = 512;             // over one block of 128 KB
constexpr int rounds = 7;

using Traces = std::shared_ptr<const BenchmarkTraces>;

TriggerSettings settings_of(TriggerKind kind) {
  TriggerSettings settings;
  settings.name = name_of(kind);
  settings.condition.kind = kind;
  settings.condition.baseline_counts.assign(benchmark_channels, benchmark_baseline_counts);
  settings.condition.channel_enabled.assign(benchmark_channels, true);
  settings.condition.level_counts.assign(benchmark_channels, benchmark_level_counts);
  settings.condition.window_samples = 150;
  settings.condition.min_samples_over = 21;
  settings.condition.length_samples = 150;
  settings.condition.sum_counts.assign(benchmark_channels, 21 * benchmark_level_counts);
  settings.condition.majority = 2;
  return settings;
}

double million_per_s(std::int64_t clocks, double seconds) { return static_cast<double>(clocks) / seconds / 1e6; }

/// The sum is kept so that the reading cannot be left out.
SpeedRow read_row(std::string name, const Traces& traces, int passes) {
  return {std::move(name), [traces, passes] {
            volatile std::int64_t sum = 0;
            const double seconds = seconds_of([&] {
              for (int pass = 0; pass < passes; ++pass)
                sum = sum + sum_codes(traces->all().data(), traces->all().size());
            });
            return million_per_s(traces->clocks() * passes, seconds);
          }};
}

SpeedRow kernel_row(std::string name, TriggerKind kind, const Traces& traces, int passes) {
  return {std::move(name), [=] {
            TriggerKernel kernel(settings_of(kind));
            std::vector<Firing> firings;
            const double seconds = seconds_of([&] {
              for (int pass = 0; pass < passes; ++pass) {
                for (std::size_t block = 0; block < traces->blocks(); ++block) {
                  firings.clear();
                  kernel.process(traces->block(block), firings);
                }
              }
            });
            CISTERN_ASSERT(kernel.samples_seen() == traces->clocks() * passes);
            return million_per_s(kernel.samples_seen(), seconds);
          }};
}

/// The same trigger sample by sample: what the kernel saves.
SpeedRow specification_row(const Traces& traces) {
  return {"time over threshold by the specification, one block", [=] {
            TriggerSpecification specification(settings_of(TriggerKind::TimeOverThreshold));
            const CodesView block = traces->block(0);
            std::int64_t firings = 0;
            const double seconds = seconds_of([&] {
              for (std::size_t s = 0; s < block.samples(); ++s) {
                const std::array<std::int16_t, benchmark_channels> codes{block.channel(0)[s], block.channel(1)[s],
                                                                         block.channel(2)[s], block.channel(3)[s]};
                firings += specification.step(codes) ? 1 : 0;
              }
            });
            CISTERN_ASSERT(firings == 0);
            return million_per_s(static_cast<std::int64_t>(block.samples()), seconds);
          }};
}

SpeedRow margin_row(const Traces& traces) {
  return {"margin of time over threshold, one block", [=] {
            MarginMeter meter(settings_of(TriggerKind::TimeOverThreshold).condition);
            const double seconds = seconds_of([&] { meter.process(traces->block(0)); });
            CISTERN_ASSERT(meter.best().has_value());
            return million_per_s(static_cast<std::int64_t>(benchmark_block_samples), seconds);
          }};
}

void print_activity(const char* name, const Traces& traces) {
  TriggerKernel kernel(settings_of(TriggerKind::TimeOverThreshold));
  std::vector<Firing> firings;
  for (std::size_t block = 0; block < traces->blocks(); ++block) kernel.process(traces->block(block), firings);
  fmt::print("{}: one firing of time over threshold in {:.0f} clocks\n", name,
             static_cast<double>(traces->clocks()) / static_cast<double>(firings.size()));
}

std::vector<SpeedRow> rows_of(const Traces& quiet, const Traces& block,
                              const std::vector<std::pair<std::string, Traces>>& busy) {
  std::vector<SpeedRow> rows{read_row("sequential read, 256 MB", quiet, 1)};
  for (const TriggerKind kind : {TriggerKind::Threshold, TriggerKind::TimeOverThreshold, TriggerKind::BoxcarSum}) {
    rows.push_back(kernel_row(fmt::format("{}, quiet, 256 MB", name_of(kind)), kind, quiet, 1));
  }
  rows.push_back(read_row("sequential read, one block in the cache", block, passes_in_cache));
  for (const TriggerKind kind : {TriggerKind::Threshold, TriggerKind::TimeOverThreshold, TriggerKind::BoxcarSum}) {
    rows.push_back(
        kernel_row(fmt::format("{}, quiet, one block in the cache", name_of(kind)), kind, block, passes_in_cache));
  }
  for (const auto& [name, traces] : busy) {
    for (const TriggerKind kind : {TriggerKind::Threshold, TriggerKind::TimeOverThreshold, TriggerKind::BoxcarSum}) {
      rows.push_back(kernel_row(fmt::format("{}, {}", name_of(kind), name), kind, traces, 1));
    }
  }
  rows.push_back(margin_row(block));
  rows.push_back(specification_row(block));
  return rows;
}

void run() {
  const auto quiet = std::make_shared<BenchmarkTraces>(Activity::Quiet, blocks_in_memory);
  const auto block = std::make_shared<BenchmarkTraces>(Activity::Quiet, 1);
  const std::vector<std::pair<std::string, Traces>> busy{
      {"busy words", std::make_shared<BenchmarkTraces>(Activity::BusyWords, blocks_when_busy)},
      {"near the minimum", std::make_shared<BenchmarkTraces>(Activity::NearMinimum, blocks_when_busy)},
      {"alternating", std::make_shared<BenchmarkTraces>(Activity::Alternating, blocks_when_busy)}};
  fmt::print("window 150, 21 over, majority 2 of 4 channels; boxcar of 150 samples; best of {} rounds\n", rounds);
  for (const auto& [name, traces] : busy) print_activity(name.c_str(), traces);
  print_speeds(rows_of(quiet, block, busy), rounds);
}

}  // namespace
}  // namespace cistern

int main() { cistern::run(); }
