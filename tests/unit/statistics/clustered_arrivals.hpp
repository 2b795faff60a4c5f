#pragma once
/// \file
/// Counts in blocks from arrivals that come in clusters, for coverage tests.
#include <cmath>
#include <cstdint>
#include <functional>

#include "bench/statistics/counting.hpp"
#include "traces/base/random.hpp"

namespace cistern {

/// Sizes of clusters and the time from the first firing of a cluster to each further one.
struct ClusterLaw {
  const char* name;
  double mean_size;
  std::function<int(RandomStream&)> size;
  double delay_blocks{0};  ///< mean of an exponential, in blocks; 0: all in the same block
};

inline int geometric_size(RandomStream& random, double mean) {
  return 1 + static_cast<int>(std::floor(std::log(random.uniform()) / std::log(1 - 1 / mean)));
}

/// Clusters start before the first block too, so that the counts are stationary.
inline BlockCounts clustered_counts(RandomStream& random, const ClusterLaw& law, int blocks, double expected_total) {
  BlockCounts counted{std::vector<std::int64_t>(static_cast<std::size_t>(blocks)), 0.1};
  const double before = 20 * law.delay_blocks;
  const auto clusters = random.poisson(expected_total / law.mean_size * (blocks + before) / blocks);
  for (std::uint32_t cluster = 0; cluster < clusters; ++cluster) {
    const double start = random.uniform(-before, blocks);
    const int size = law.size(random);
    for (int member = 0; member < size; ++member) {
      const double at = member == 0 || law.delay_blocks == 0 ? start : start + random.exponential(law.delay_blocks);
      if (at >= 0 && at < blocks) ++counted.counts[static_cast<std::size_t>(at)];
    }
  }
  return counted;
}

}  // namespace cistern
