#include "bench/statistics/counting.hpp"

#include <algorithm>
#include <boost/math/distributions/normal.hpp>
#include <boost/math/distributions/students_t.hpp>
#include <boost/math/special_functions/gamma.hpp>
#include <cmath>
#include <limits>
#include <numeric>

namespace cistern {
namespace {

constexpr std::size_t groups_min = 30;       // fewer leave an index uncertain by more than a quarter
constexpr std::size_t groups_to_tell = 200;  // Fisher's test then turns down an index above 1.2
constexpr double mean_to_tell = 5;           // chi-squared stands for the index from about here: common practice
constexpr double tail = 0.025;               // the test at 95 %, central

constexpr std::string_view poisson_method = "Poisson (Garwood)";
constexpr std::string_view effective_method = "Poisson on effective counts, firings divided by their dispersion";
constexpr std::string_view single_method = "Poisson; nothing is known of clusters";

/// Sums of `size` neighbouring blocks; an incomplete last group is left out.
std::vector<std::int64_t> grouped(const std::vector<std::int64_t>& counts, std::size_t size) {
  std::vector<std::int64_t> groups;
  for (std::size_t i = 0; i + size <= counts.size(); i += size) {
    const auto first = counts.begin() + static_cast<std::ptrdiff_t>(i);
    groups.push_back(std::accumulate(first, first + static_cast<std::ptrdiff_t>(size), std::int64_t{0}));
  }
  return groups;
}

double mean_of(const std::vector<std::int64_t>& counts) {
  return static_cast<double>(std::accumulate(counts.begin(), counts.end(), std::int64_t{0})) /
         static_cast<double>(counts.size());
}

/// What the blocks say about clustering.
struct Clustering {
  double index{1};           ///< the largest in blocks and in groups of them; 1 if none exceeds it
  std::size_t freedom{0};    ///< of that index; 0: there was none
  bool can_tell{false};      ///< enough firings for Fisher's test in at least one grouping
  bool looks_poisson{true};  ///< in all groupings with enough firings
};

Clustering clustering_of(const std::vector<std::int64_t>& counts) {
  Clustering clustering;
  for (std::size_t size = 1; size == 1 || counts.size() / size >= groups_min; size *= 2) {
    const auto groups = grouped(counts, size);
    const auto dispersion = dispersion_of(groups);
    if (!dispersion) break;
    if (clustering.freedom == 0 || dispersion->index > clustering.index) {
      clustering.index = std::max(1.0, dispersion->index);
      clustering.freedom = groups.size() - 1;
    }
    if (groups.size() < groups_to_tell || mean_of(groups) < mean_to_tell) continue;
    clustering.can_tell = true;
    if (dispersion->p_low < tail || dispersion->p_high < tail) clustering.looks_poisson = false;
  }
  return clustering;
}

bool is_poisson(const Clustering& clustering) { return clustering.can_tell && clustering.looks_poisson; }

/// A handful of single firings does not show that there are no clusters: one pair of firings is
/// added to what the index is made of, sum of squares over sum.
double index_with_a_pair(double index, double firings) { return (index * firings + 4) / (firings + 2); }

/// What the firings are divided by before Garwood's limits, and the limits multiplied by after. An
/// index from few groups is itself uncertain: Student's quantile in place of the normal one.
double factor_of(const BlockCounts& blocks, const Clustering& clustering, double one_sided_confidence) {
  if (is_poisson(clustering) || clustering.freedom == 0) return 1;
  const boost::math::students_t student(static_cast<double>(clustering.freedom));
  // Near the middle both quantiles tend to 0, so the ratio is taken at 95 % at least.
  const double confidence = std::max(one_sided_confidence, 0.95);
  const double ratio =
      boost::math::quantile(student, confidence) / boost::math::quantile(boost::math::normal(), confidence);
  return index_with_a_pair(clustering.index, static_cast<double>(blocks.total())) * ratio * ratio;
}

double low_limit(const BlockCounts& blocks, const Clustering& clustering, double confidence) {
  if (blocks.counts.empty()) return 0;
  const double factor = factor_of(blocks, clustering, confidence);
  return garwood_low(static_cast<double>(blocks.total()) / factor, confidence) * factor / blocks.live_time_s();
}

double high_limit(const BlockCounts& blocks, const Clustering& clustering, double confidence) {
  if (blocks.counts.empty()) return std::numeric_limits<double>::infinity();
  const double factor = factor_of(blocks, clustering, confidence);
  return garwood_high(static_cast<double>(blocks.total()) / factor, confidence) * factor / blocks.live_time_s();
}

std::string_view method_of(const Clustering& clustering) {
  if (is_poisson(clustering)) return poisson_method;
  return clustering.freedom == 0 ? single_method : effective_method;
}

}  // namespace

std::int64_t BlockCounts::total() const { return std::accumulate(counts.begin(), counts.end(), std::int64_t{0}); }

double BlockCounts::live_time_s() const { return static_cast<double>(counts.size()) * block_s; }

std::optional<Dispersion> dispersion_of(const std::vector<std::int64_t>& counts) {
  if (counts.size() < 2 || mean_of(counts) == 0) return {};
  const double mean = mean_of(counts);
  double squares = 0;
  for (const std::int64_t count : counts) squares += std::pow(static_cast<double>(count) - mean, 2);
  const double freedom = static_cast<double>(counts.size() - 1);
  const double chi_squared = squares / mean;
  return Dispersion{chi_squared / freedom, boost::math::gamma_p(freedom / 2, chi_squared / 2),
                    boost::math::gamma_q(freedom / 2, chi_squared / 2)};
}

RateEstimate estimate_rate(const BlockCounts& blocks, double confidence) {
  const Clustering clustering = clustering_of(blocks.counts);
  const double one_sided = 0.5 + confidence / 2;
  RateEstimate estimate;
  estimate.two_sided = {low_limit(blocks, clustering, one_sided), high_limit(blocks, clustering, one_sided)};
  if (blocks.counts.empty()) return estimate;
  estimate.rate_hz = static_cast<double>(blocks.total()) / blocks.live_time_s();
  estimate.dispersion = clustering.index;
  estimate.poisson_applies = is_poisson(clustering);
  estimate.method = method_of(clustering);
  if (const auto dispersion = dispersion_of(blocks.counts)) {
    estimate.dispersion_p_low = dispersion->p_low;
    estimate.dispersion_p_high = dispersion->p_high;
  }
  return estimate;
}

double rate_at_most(const BlockCounts& blocks, double confidence) {
  return high_limit(blocks, clustering_of(blocks.counts), confidence);
}

double rate_at_least(const BlockCounts& blocks, double confidence) {
  return low_limit(blocks, clustering_of(blocks.counts), confidence);
}

double firings_per_independent_one(const BlockCounts& blocks, double one_sided_confidence) {
  return factor_of(blocks, clustering_of(blocks.counts), one_sided_confidence);
}

}  // namespace cistern
