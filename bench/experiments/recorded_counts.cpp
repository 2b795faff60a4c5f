#include "bench/experiments/recorded_counts.hpp"

#include <fmt/format.h>

#include <algorithm>

namespace cistern {
namespace {

constexpr std::string_view triggered_by = "triggered_by:";

/// The live time behind one trace, where it is known and the traces are unbiased.
std::optional<double> seconds_per_trace(const RecordedCounts& counts, const RecordedFacts& facts) {
  if (facts.selection != "unbiased" || !facts.live_time_s || counts.traces == 0) return {};
  return *facts.live_time_s / static_cast<double>(counts.traces);
}

std::string why_no_rate(const RecordedFacts& facts) {
  if (facts.selection.rfind(triggered_by, 0) == 0) {
    return fmt::format(
        "no background rate or absolute efficiency from the recorded traces: they were selected by a trigger ({}), so "
        "only what holds given that trigger is told",
        facts.selection);
  }
  if (facts.selection.empty()) {
    return "no background rate from the recorded traces: neither the file nor [traces] selection says how they were "
           "selected";
  }
  return "no background rate from the recorded traces: neither the file nor [traces] live_time_s says their live time";
}

std::string share_condition(const RecordedFacts& facts) {
  return facts.selection.rfind(triggered_by, 0) == 0 ? ".given_" + facts.selection.substr(triggered_by.size()) : "";
}

}  // namespace

RecordedTally::RecordedTally(RecordedCounts& counts, const std::vector<TriggerSettings>& triggers)
    : counts_(counts), triggers_(triggers), passed_in_trace_(triggers.size(), 0) {
  counts_.triggers.resize(triggers.size());
}

bool RecordedTally::fired(TriggerSet set) const {
  const auto members = members_of(set, triggers_);
  return std::any_of(members.begin(), members.end(), [this](std::size_t t) { return passed_in_trace_[t] > 0; });
}

void RecordedTally::compare_stations() {
  if (!are_comparable(triggers_)) return;
  RecordedPairs& pairs = counts_.pairs;
  const bool candidate = fired(TriggerSet::Candidate);
  ++(fired(TriggerSet::InService) ? (candidate ? pairs.both : pairs.only_in_service)
                                  : (candidate ? pairs.only_candidate : pairs.neither));
}

void RecordedTally::take(std::size_t trigger, FiringStatus status) {
  ++counts_.triggers[trigger].firings;
  if (status == FiringStatus::Passed) ++passed_in_trace_[trigger];
}

void RecordedTally::end_trace(const RecordedTrace& trace) {
  compare_stations();
  for (std::size_t t = 0; t < counts_.triggers.size(); ++t) {
    TriggerRecordedCounts& own = counts_.triggers[t];
    if (const auto& best = trace.margins[t]) own.margins.push_back(static_cast<double>(best->margin));
    own.traces_fired += passed_in_trace_[t] > 0 ? 1 : 0;
    own.passed += passed_in_trace_[t];
    own.passed_per_trace.push_back(passed_in_trace_[t]);
    passed_in_trace_[t] = 0;
  }
  ++counts_.traces;
  counts_.samples += trace.samples;
}

std::vector<MeasuredFigure> recorded_figures(const RecordedCounts& counts, const RecordedFacts& facts,
                                             const StationPlan& plan, std::vector<std::string>& notes) {
  std::vector<MeasuredFigure> figures;
  const auto trace_s = seconds_per_trace(counts, facts);
  if (!trace_s) notes.push_back(why_no_rate(facts));
  for (std::size_t t = 0; t < plan.triggers.size(); ++t) {
    const std::string& name = plan.triggers[t].name;
    const TriggerRecordedCounts& own = counts.triggers[t];
    if (trace_s) {
      figures.push_back({"background_rate." + name + ".recorded", "Hz",
                         fmt::format("{} firings in {:.4g} s of recorded traces", own.passed, *facts.live_time_s),
                         RateBasis{{own.passed_per_trace, *trace_s}}});
    }
    figures.push_back({"fired_share." + name + share_condition(facts), "", "recorded traces with at least one firing",
                       ProportionBasis{own.traces_fired, counts.traces}});
    auto margins = own.margins;
    std::sort(margins.begin(), margins.end());
    figures.push_back({"margin_median." + name + ".recorded", std::string(margin_unit(plan.triggers[t].condition.kind)),
                       "best of each trace; at least 0 fires", QuantileBasis{std::move(margins), 0.5}});
  }
  if (are_comparable(plan.triggers)) {
    figures.push_back(
        {"gain.candidate.recorded", "",
         "share of the recorded traces that fire the candidate less that of the station in service, paired by trace",
         PairedBasis{counts.pairs.only_candidate, counts.pairs.only_in_service, counts.traces}});
  }
  return figures;
}

}  // namespace cistern
