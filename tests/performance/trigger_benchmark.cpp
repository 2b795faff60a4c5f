/// \file
/// How fast the trigger kernels run, beside the plain sequential read of the same memory. Four channels;
/// a clock is one sample of all of them, 8 bytes.
#include <fmt/core.h>

#include <array>
#include <memory>

#include "firmware_model/trigger/block_scans.hpp"
#include "firmware_model/trigger/kernel.hpp"
#include "firmware_model/trigger/margin.hpp"
#include "firmware_model/trigger/specification.hpp"
#include "tests/cosim/verilated_speed.hpp"
#include "tests/performance/benchmark_traces.hpp"
#include "tests/performance/speed_table.hpp"
#include "tests/performance/systemc_speed.hpp"
#include "traces/base/errors.hpp"

namespace cistern {
namespace {

constexpr std::size_t blocks_in_memory = 2'048;  // 256 MB, far more than any cache
constexpr std::size_t blocks_a_round = 256;      // 32 MB
constexpr int passes_in_cache = 256;             // over one block of 128 KB
constexpr std::int64_t systemc_clocks = 1'000'000;
constexpr int rounds = 60;

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

/// What one round of a row reads: a number of blocks, a number of times.
struct Share {
  Traces traces;
  std::size_t blocks;
  int passes;
  [[nodiscard]] std::int64_t clocks() const {
    return static_cast<std::int64_t>(blocks * benchmark_block_samples) * passes;
  }
};

/// Reads in runs of 8,192 samples, which is no slower than one long run. The sum is kept so that the reading cannot be
/// left out.
SpeedRow read_row(std::string name, const Share& share) {
  return {std::move(name), [share] {
            constexpr std::size_t run_samples = 8'192;
            const std::int16_t* begin = share.traces->block(share.traces->next_blocks(share.blocks)).channel(0).data();
            const std::size_t samples = share.blocks * benchmark_channels * benchmark_block_samples;
            volatile std::int64_t sum = 0;
            const double seconds = seconds_of([&] {
              for (int pass = 0; pass < share.passes; ++pass) {
                for (std::size_t at = 0; at < samples; at += run_samples)
                  sum = sum + sum_codes(begin + at, run_samples);
              }
            });
            return million_per_s(share.clocks(), seconds);
          }};
}

SpeedRow kernel_row(std::string name, TriggerKind kind, const Share& share) {
  return {std::move(name), [=] {
            TriggerKernel kernel(settings_of(kind));
            const std::size_t first = share.traces->next_blocks(share.blocks);
            std::vector<Firing> firings;
            const double seconds = seconds_of([&] {
              for (int pass = 0; pass < share.passes; ++pass) {
                for (std::size_t block = first; block < first + share.blocks; ++block) {
                  firings.clear();
                  kernel.process(share.traces->block(block), firings);
                }
              }
            });
            CISTERN_ASSERT(kernel.samples_seen() == share.clocks());
            return million_per_s(kernel.samples_seen(), seconds);
          }};
}

/// The same memory with the channels far apart: the reading changes place with every channel and block.
SpeedRow far_channels_row(const Traces& traces) {
  return {"time_over_threshold, quiet, channels 64 MB apart", [=] {
            TriggerKernel kernel(settings_of(TriggerKind::TimeOverThreshold));
            const std::size_t samples = traces->all().size() / benchmark_channels;
            const CodesView all(traces->all().data(), benchmark_channels, samples, samples);
            std::vector<Firing> firings;
            const double seconds = seconds_of([&] { kernel.process(all, firings); });
            CISTERN_ASSERT(firings.empty());
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
  fmt::print("{}: {} firings of time over threshold in {} clocks\n", name, firings.size(), traces->clocks());
}

void add_kernel_rows(std::vector<SpeedRow>& rows, const std::string& what, const Share& share) {
  for (const TriggerKind kind : {TriggerKind::Threshold, TriggerKind::TimeOverThreshold, TriggerKind::BoxcarSum}) {
    rows.push_back(kernel_row(fmt::format("{}, {}", name_of(kind), what), kind, share));
  }
}

std::vector<SpeedRow> rows_of(const Traces& quiet, const Traces& block,
                              const std::vector<std::pair<std::string, Traces>>& busy) {
  const Share from_memory{quiet, blocks_a_round, 1};
  const Share from_cache{block, 1, passes_in_cache};
  std::vector<SpeedRow> rows{read_row("sequential read, memory", from_memory)};
  add_kernel_rows(rows, "quiet, memory", from_memory);
  rows.push_back(far_channels_row(quiet));
  rows.push_back(read_row("sequential read, cache", from_cache));
  add_kernel_rows(rows, "quiet, cache", from_cache);
  for (const auto& [name, traces] : busy) add_kernel_rows(rows, name, {traces, blocks_a_round, 1});
  rows.push_back(margin_row(block));
  rows.push_back(specification_row(block));
  rows.front().column = "x the read";
  rows.push_back(
      {"time over threshold in Verilated Verilog, quiet", verilated_tot_million_clocks_per_second, "x Verilated"});
  rows.push_back({"time over threshold stepped on an sc_clock, quiet",
                  [] { return systemc_clocked_million_clocks_per_second(systemc_clocks); }, "x sc_clock"});
  return rows;
}

void run() {
  const auto quiet = std::make_shared<BenchmarkTraces>(Activity::Quiet, blocks_in_memory);
  const auto block = std::make_shared<BenchmarkTraces>(Activity::Quiet, 1);
  const std::vector<std::pair<std::string, Traces>> busy{
      {"busy words", std::make_shared<BenchmarkTraces>(Activity::BusyWords, blocks_a_round)},
      {"near the minimum", std::make_shared<BenchmarkTraces>(Activity::NearMinimum, blocks_a_round)},
      {"alternating", std::make_shared<BenchmarkTraces>(Activity::Alternating, blocks_a_round)}};
  fmt::print("window 150, 21 over, majority 2 of 4 channels; boxcar of 150 samples; best of up to {} rounds\n", rounds);
  for (const auto& [name, traces] : busy) print_activity(name.c_str(), traces);
  print_speeds(rows_of(quiet, block, busy), rounds);
}

}  // namespace
}  // namespace cistern

int main() { cistern::run(); }
