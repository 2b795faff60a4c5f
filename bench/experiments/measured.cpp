#include "bench/experiments/measured.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <tuple>

#include "bench/statistics/extra_work.hpp"
#include "bench/statistics/intervals.hpp"
#include "bench/statistics/mcnemar.hpp"
#include "bench/statistics/quantiles.hpp"
#include "bench/statistics/requirement.hpp"
#include "traces/base/errors.hpp"
#include "traces/base/spelling.hpp"

namespace cistern {
namespace {

constexpr double figure_confidence = 0.95;

enum class Sides { Two, One };

struct Estimate {
  std::optional<double> value;
  std::optional<double> low;
  std::optional<double> high;
};

std::optional<double> finite(double value) { return std::isfinite(value) ? std::optional(value) : std::nullopt; }

/// Limits as an estimate: an end that the data do not bound is absent.
Estimate with_limits(double value, Limits limits) { return {value, finite(limits.low), finite(limits.high)}; }

struct Estimator {
  double confidence;
  Sides sides;

  Estimate operator()(const ProportionBasis& basis) const {
    if (basis.trials == 0) return {};
    const double share = static_cast<double>(basis.successes) / static_cast<double>(basis.trials);
    if (sides == Sides::Two) return with_limits(share, clopper_pearson(basis.successes, basis.trials, confidence));
    return with_limits(share, {clopper_pearson_low(basis.successes, basis.trials, confidence),
                               clopper_pearson_high(basis.successes, basis.trials, confidence)});
  }
  Estimate operator()(const RateBasis& basis) const {
    if (basis.blocks.counts.empty()) return {};
    const RateEstimate estimate = estimate_rate(basis.blocks, confidence);
    if (sides == Sides::Two) return with_limits(estimate.rate_hz, estimate.two_sided);
    return with_limits(estimate.rate_hz,
                       {rate_at_least(basis.blocks, confidence), rate_at_most(basis.blocks, confidence)});
  }
  Estimate operator()(const QuantileBasis& basis) const {
    if (basis.sorted.empty()) return {};
    const double value = quantile_of(basis.sorted, basis.fraction);
    if (sides == Sides::Two) return with_limits(value, quantile_limits(basis.sorted, basis.fraction, confidence));
    return with_limits(value, {quantile_low(basis.sorted, basis.fraction, confidence),
                               quantile_high(basis.sorted, basis.fraction, confidence)});
  }
  Estimate operator()(const PairedBasis& basis) const {
    if (basis.pairs == 0) return {};
    const auto [candidate, in_service, pairs] = std::tuple(basis.only_candidate, basis.only_in_service, basis.pairs);
    const double gain = static_cast<double>(candidate - in_service) / static_cast<double>(pairs);
    if (sides == Sides::Two) return with_limits(gain, paired_difference(candidate, in_service, pairs, confidence));
    return with_limits(gain, {paired_difference_low(candidate, in_service, pairs, confidence),
                              paired_difference_high(candidate, in_service, pairs, confidence)});
  }
  Estimate operator()(const PlainBasis& basis) const { return {finite(basis.value), {}, {}}; }
};

std::string count_text(std::int64_t count) {
  std::string digits = std::to_string(count);
  for (auto at = static_cast<std::ptrdiff_t>(digits.size()) - 3; at > 0; at -= 3)
    digits.insert(static_cast<std::size_t>(at), ",");
  return digits;
}

/// What would decide it, in words.
struct MoreNeeded {
  const Requirement& requirement;

  std::string operator()(const RateBasis& basis) const {
    const auto more = extra_live_time_s(basis.blocks, requirement.bound, requirement.confidence);
    return more ? fmt::format("about {} s more live time would decide it if the rate stays", number_text(*more))
                : "the rate is so close to the bound that no realistic live time would decide it";
  }
  std::string operator()(const ProportionBasis& basis) const {
    const auto more = extra_trials(basis.successes, basis.trials, requirement.bound, requirement.confidence);
    return more ? fmt::format("about {} more signals would decide it if the share stays", count_text(*more))
                : "the share is so close to the bound that no realistic number of signals would decide it";
  }
  std::string operator()(const QuantileBasis&) const { return "more signals that fire would narrow the limits"; }
  std::string operator()(const PairedBasis&) const { return "more signals would narrow the limits"; }
  std::string operator()(const PlainBasis&) const { return {}; }
};

RequirementOutcome start_outcome(const Requirement& requirement, const std::string& unit) {
  RequirementOutcome outcome;
  outcome.name = requirement.name;
  outcome.bound =
      fmt::format("{} {} {}{}{}", requirement.figure, requirement.kind == BoundKind::AtMost ? "at most" : "at least",
                  number_text(requirement.bound), unit.empty() ? "" : " ", unit);
  return outcome;
}

/// Without limits the value itself decides.
Verdict verdict_of(const Requirement& requirement, const Estimate& estimate) {
  constexpr double unbounded = std::numeric_limits<double>::infinity();
  const bool has_limits = estimate.low || estimate.high;
  const Limits limits = has_limits ? Limits{estimate.low.value_or(-unbounded), estimate.high.value_or(unbounded)}
                                   : Limits{*estimate.value, *estimate.value};
  return requirement.kind == BoundKind::AtMost ? judge_at_most(limits, requirement.bound)
                                               : judge_at_least(limits, requirement.bound);
}

}  // namespace

std::string number_text(double value) {
  if (value == 0) return "0";
  const double size = std::abs(value);
  if (size >= 1000 && size < 1e9) return count_text(std::llround(value));
  return fmt::format("{:.3g}", value);
}

Figure figure_of(const MeasuredFigure& measured) {
  const Estimate estimate = std::visit(Estimator{figure_confidence, Sides::Two}, measured.basis);
  Figure figure{measured.name, estimate.value, estimate.low, estimate.high, {}, {}, measured.unit, measured.note};
  if (const auto* rate = std::get_if<RateBasis>(&measured.basis); rate != nullptr && !rate->blocks.counts.empty()) {
    const RateEstimate counted = estimate_rate(rate->blocks, figure_confidence);
    figure.note += fmt::format("{}{} blocks of {:.3g} s; variance over mean allowed for: {:.3g}; {}",
                               figure.note.empty() ? "" : "; ", rate->blocks.counts.size(), rate->blocks.block_s,
                               counted.dispersion, counted.method);
  }
  return figure;
}

RequirementOutcome undecided(const Requirement& requirement, const std::string& why) {
  RequirementOutcome outcome = start_outcome(requirement, "");
  outcome.verdict = "undecided";
  outcome.reason = why;
  return outcome;
}

RequirementOutcome judge(const Requirement& requirement, const MeasuredFigure& measured) {
  const Estimate estimate = std::visit(Estimator{requirement.confidence, Sides::One}, measured.basis);
  if (!estimate.value) return undecided(requirement, "nothing was measured for it in this run");
  RequirementOutcome outcome = start_outcome(requirement, measured.unit);
  outcome.value = estimate.value;
  outcome.low = estimate.low;
  outcome.high = estimate.high;
  outcome.verdict = name_of(verdict_of(requirement, estimate));
  if (outcome.verdict == "undecided")
    outcome.reason = "the limits straddle the bound; " + std::visit(MoreNeeded{requirement}, measured.basis);
  return outcome;
}

std::vector<RequirementOutcome> judge_all(const std::vector<Requirement>& requirements,
                                          const std::vector<MeasuredFigure>& figures) {
  std::vector<RequirementOutcome> outcomes;
  for (const Requirement& requirement : requirements) {
    const auto found = std::find_if(figures.begin(), figures.end(),
                                    [&](const auto& figure) { return figure.name == requirement.figure; });
    if (found != figures.end()) outcomes.push_back(judge(requirement, *found));
  }
  return outcomes;
}

void check_figures_exist(const std::vector<Requirement>& requirements, const std::vector<std::string>& names) {
  for (const Requirement& requirement : requirements) {
    if (std::find(names.begin(), names.end(), requirement.figure) != names.end()) continue;
    throw InputError(requirement.place,
                     fmt::format("[requirements.{}] figure: this run has no figure `{}`; nearest: {}", requirement.name,
                                 requirement.figure, nearest_word(requirement.figure, names)));
  }
}

std::string overall_verdict(const std::vector<RequirementOutcome>& outcomes) {
  if (outcomes.empty()) return "no requirements";
  const auto any = [&](const char* verdict) {
    return std::any_of(outcomes.begin(), outcomes.end(),
                       [&](const auto& outcome) { return outcome.verdict == verdict; });
  };
  return any("not met") ? "not met" : any("undecided") ? "undecided" : "met";
}

}  // namespace cistern
