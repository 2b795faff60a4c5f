#include "bench/statistics/counting.hpp"

#include <algorithm>
#include <boost/math/special_functions/gamma.hpp>
#include <limits>
#include <numeric>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

constexpr std::size_t groups_min = 30;          // fewer leave the index uncertain by more than 26 %
constexpr double mean_min = 5;                  // chi-squared stands for the index from about here: common practice
constexpr double tail = 0.025;                  // Fisher's test at 95 %, central

constexpr std::string_view poisson_method = "Poisson (Garwood)";
constexpr std::string_view clustered_method = "Poisson on effective counts: firings divided by their dispersion";
constexpr std::string_view nothing_method = "no live time";

/// Sums of `size` neighbouring blocks; an incomplete last group is left out.
std::vector<std::int64_t> grouped(const std::vector<std::int64_t>& counts, std::size_t size) {
  std::vector<std::int64_t> groups;
  for (std::size_t i = 0; i + size <= counts.size(); i += size) {
    const auto first = counts.begin() + static_cast<std::ptrdiff_t>(i);
    groups.push_back(std::accumulate(first, first + static_cast<std::ptrdiff_t>(size), std::int64_t{0}));
  }
  return groups;
}

/// What the blocks say about clustering.
struct Clustering {
  double factor{1};       ///< the largest index found in blocks and in groups of them, at least 1
  bool can_tell{false};   ///< enough firings for Fisher's test in at least one grouping
  bool looks_poisson{true};
};

Clustering clustering_of(const std::vector<std::int64_t>& counts) {
  Clustering clustering;
  for (std::size_t size = 1; size == 1 || counts.size() / size >= groups_min; size *= 2) {
    const auto groups = grouped(counts, size);
    const auto dispersion = dispersion_of(groups);
    if (!dispersion) break;
    clustering.factor = std::max(clustering.factor, dispersion->index);
    const double mean = static_cast<double>(std::accumulate(groups.begin(), groups.end(), std::int64_t{0})) /
                        static_cast<double>(groups.size());
    if (groups.size() < groups_min || mean < mean_min) continue;
    clustering.can_tell = true;
    if (dispersion->p_low < tail || dispersion->p_high < tail) clustering.looks_poisson = false;
  }
  return clustering;
}

/// How the limits on a rate are made: on firings / factor, then times factor.
struct EffectiveCount {
  double count{0};
  double factor{1};
  double live_time_s{0};
  bool poisson{false};
};

EffectiveCount basis_of(const BlockCounts& blocks) {
  const Clustering clustering = clustering_of(blocks.counts);
  const bool poisson = clustering.can_tell && clustering.looks_poisson;
  const double factor = poisson ? 1 : clustering.factor;
  return {static_cast<double>(blocks.total()) / factor, factor, blocks.live_time_s(), poisson};
}

double low_limit(const EffectiveCount& basis, double confidence) {
  if (basis.live_time_s == 0) return 0;
  return garwood_low(basis.count, confidence) * basis.factor / basis.live_time_s;
}

double high_limit(const EffectiveCount& basis, double confidence) {
  if (basis.live_time_s == 0) return std::numeric_limits<double>::infinity();
  return garwood_high(basis.count, confidence) * basis.factor / basis.live_time_s;
}

}  // namespace

std::int64_t BlockCounts::total() const { return std::accumulate(counts.begin(), counts.end(), std::int64_t{0}); }

double BlockCounts::live_time_s() const { return static_cast<double>(counts.size()) * block_s; }

std::optional<Dispersion> dispersion_of(const std::vector<std::int64_t>& counts) {
  const auto total = std::accumulate(counts.begin(), counts.end(), std::int64_t{0});
  if (counts.size() < 2 || total == 0) return {};
  const double mean = static_cast<double>(total) / static_cast<double>(counts.size());
  double squares = 0;
  for (const std::int64_t count : counts) {
    const double distance = static_cast<double>(count) - mean;
    squares += distance * distance;
  }
  const double freedom = static_cast<double>(counts.size() - 1);
  const double chi_squared = squares / mean;
  return Dispersion{chi_squared / freedom, boost::math::gamma_p(freedom / 2, chi_squared / 2),
                    boost::math::gamma_q(freedom / 2, chi_squared / 2)};
}

RateEstimate estimate_rate(const BlockCounts& blocks, double confidence) {
  RateEstimate estimate;
  const EffectiveCount basis = basis_of(blocks);
  const double one_sided = 0.5 + confidence / 2;
  estimate.two_sided = {low_limit(basis, one_sided), high_limit(basis, one_sided)};
  estimate.method = nothing_method;
  if (basis.live_time_s == 0) return estimate;
  estimate.rate_hz = static_cast<double>(blocks.total()) / basis.live_time_s;
  estimate.dispersion = basis.factor;
  estimate.poisson_applies = basis.poisson;
  estimate.method = basis.poisson ? poisson_method : clustered_method;
  if (const auto dispersion = dispersion_of(blocks.counts)) {
    estimate.dispersion_p_low = dispersion->p_low;
    estimate.dispersion_p_high = dispersion->p_high;
  }
  return estimate;
}

double rate_at_most(const BlockCounts& blocks, double confidence) { return high_limit(basis_of(blocks), confidence); }

double rate_at_least(const BlockCounts& blocks, double confidence) { return low_limit(basis_of(blocks), confidence); }

}  // namespace cistern
