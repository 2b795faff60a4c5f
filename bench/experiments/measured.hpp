#pragma once
/// \file
/// A figure together with the counts behind it, so that limits at any confidence, and what more
/// work would be needed, can be told from it.
#include <cstdint>
#include <string>
#include <variant>
#include <vector>

#include "bench/results/figure.hpp"
#include "bench/scenario/scenario.hpp"
#include "bench/statistics/counting.hpp"

namespace cistern {

/// So many of so many; limits by Clopper and Pearson.
struct ProportionBasis {
  std::int64_t successes{0};
  std::int64_t trials{0};
};

/// Counts in blocks of live time; limits that hold for clustered firings.
struct RateBasis {
  BlockCounts blocks;
};

/// A quantile of measured values; distribution-free limits from order statistics.
struct QuantileBasis {
  std::vector<double> sorted;
  double fraction{0.5};
};

/// The difference of two paired proportions (candidate less in service).
struct PairedBasis {
  std::int64_t only_candidate{0};
  std::int64_t only_in_service{0};
  std::int64_t pairs{0};
};

/// A number without limits of its own.
struct PlainBasis {
  double value{0};
};

struct MeasuredFigure {
  std::string name;
  std::string unit;
  std::string note;
  std::variant<ProportionBasis, RateBasis, QuantileBasis, PairedBasis, PlainBasis> basis;
};

/// With two-sided 95 % limits.
[[nodiscard]] Figure figure_of(const MeasuredFigure& measured);

/// Met, not met or undecided by one-sided limits at the requirement's confidence; when undecided,
/// the reason says how much more live time or how many more signals it would take.
[[nodiscard]] RequirementOutcome judge(const Requirement& requirement, const MeasuredFigure& measured);

/// The outcome for a figure that this run cannot give. \param why  one sentence
[[nodiscard]] RequirementOutcome undecided(const Requirement& requirement, const std::string& why);

/// Judges the requirements whose figures are among `figures`; the others were refused before the
/// run, or belong to another command, and are left out.
[[nodiscard]] std::vector<RequirementOutcome> judge_all(const std::vector<Requirement>& requirements,
                                                        const std::vector<MeasuredFigure>& figures);

/// InputError for the first requirement on a figure that is not among `names`: told before the run.
void check_figures_exist(const std::vector<Requirement>& requirements, const std::vector<std::string>& names);

/// "met", "not met", "undecided" of all together: the worst of them; "no requirements".
[[nodiscard]] std::string overall_verdict(const std::vector<RequirementOutcome>& outcomes);

/// A number for people: 3 significant digits, with its unit.
[[nodiscard]] std::string number_text(double value);

}  // namespace cistern
