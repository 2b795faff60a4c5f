#include "tests/cosim/verilated_speed.hpp"

#include <chrono>
#include <cstdint>
#include <vector>

#include "traces/base/errors.hpp"
#include "traces/base/random.hpp"
#include "verilated_time_over_threshold.h"

namespace cistern {
namespace {

constexpr std::uint64_t kBaseline = 200;  // the default of time_over_threshold.v

/// Baseline and noise of at most two counts, four 16-bit codes in a word.
std::vector<std::uint64_t> quiet_samples(std::size_t count) {
  RandomStream stream(1, Purpose::PropertyTest, 0);
  std::vector<std::uint64_t> words(count, 0);
  for (std::uint64_t& word : words) {
    for (int c = 0; c < 4; ++c) word = word << 16U | (kBaseline - 2 + stream.next_word() % 5);
  }
  return words;
}

void clock(verilated_time_over_threshold& model) {
  model.clk = 0;
  model.eval();
  model.clk = 1;
  model.eval();
}

}  // namespace

double verilated_tot_million_clocks_per_second() {
  constexpr int kRounds = 300;
  const std::vector<std::uint64_t> samples = quiet_samples(65'536);
  VerilatedContext context;
  verilated_time_over_threshold model(&context);
  model.rst = 1;
  clock(model);
  model.rst = 0;
  std::int64_t firings = 0;
  const auto start = std::chrono::steady_clock::now();
  for (int round = 0; round < kRounds; ++round) {
    for (const std::uint64_t word : samples) {
      model.samples = word;
      clock(model);
      firings += model.fire;
    }
  }
  const std::chrono::duration<double> wall_time_s = std::chrono::steady_clock::now() - start;
  CISTERN_ASSERT(firings == 0);  // quiet, and not because it was asleep:
  model.samples = ~std::uint64_t{0};
  for (int over = 0; over < 21; ++over) clock(model);
  CISTERN_ASSERT(model.fire == 1);
  model.final();
  return static_cast<double>(samples.size()) * kRounds / wall_time_s.count() / 1e6;
}

}  // namespace cistern
