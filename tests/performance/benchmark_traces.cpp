#include "tests/performance/benchmark_traces.hpp"

#include <algorithm>

#include "traces/base/errors.hpp"
#include "traces/base/random.hpp"

namespace cistern {
namespace {

constexpr std::size_t different_blocks = 64;  // then they repeat: drawing all would take longer than the benchmark

double over_share(Activity activity) {
  switch (activity) {
    case Activity::Quiet: return 0;
    case Activity::BusyWords: return 1.0 / 16;
    case Activity::NearMinimum: return 21.0 / 150;
    case Activity::Alternating: return 0;
  }
  report_bug("known activity", __FILE__, __LINE__);
}

bool is_over(Activity activity, std::size_t sample, std::size_t always_over, RandomStream& stream) {
  if (activity == Activity::Alternating) return sample % 2 == 0;
  return stream.uniform() < over_share(activity) || (activity != Activity::Quiet && sample % 64 == always_over);
}

}  // namespace

BenchmarkTraces::BenchmarkTraces(Activity activity, std::size_t blocks)
    : blocks_(blocks), codes_(blocks * benchmark_channels * benchmark_block_samples) {
  RandomStream stream(1, Purpose::PropertyTest, static_cast<std::uint64_t>(activity));
  const std::size_t drawn = std::min(blocks, different_blocks) * benchmark_channels * benchmark_block_samples;
  std::size_t always_over = 0;
  for (std::size_t i = 0; i < drawn; ++i) {
    if (i % 64 == 0) always_over = static_cast<std::size_t>(stream.uniform() * 64);
    const bool over = is_over(activity, i, always_over, stream);
    codes_[i] = static_cast<std::int16_t>(benchmark_baseline_counts + (over ? benchmark_level_counts : 0) +
                                          static_cast<int>(stream.uniform(0, 9)) - (over ? 0 : 4));
  }
  for (std::size_t i = drawn; i < codes_.size(); ++i) codes_[i] = codes_[i - drawn];
}

CodesView BenchmarkTraces::block(std::size_t number) const {
  return {codes_.data() + number * benchmark_channels * benchmark_block_samples, benchmark_channels,
          benchmark_block_samples, benchmark_block_samples};
}

std::size_t BenchmarkTraces::next_blocks(std::size_t count) const {
  const std::size_t first = next_;
  next_ = (next_ + count) % blocks_;
  return first;
}

}  // namespace cistern
