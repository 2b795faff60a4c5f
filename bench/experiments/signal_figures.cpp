#include "bench/experiments/signal_figures.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "bench/experiments/subjects.hpp"
#include "bench/statistics/mcnemar.hpp"
#include "firmware_model/trigger/margin.hpp"

namespace cistern {
namespace {

std::vector<double> delays_ns(const std::vector<std::int32_t>& delays, double rate_mhz) {
  std::vector<double> ns;
  for (const std::int32_t delay : delays) {
    if (delay >= 0) ns.push_back(delay * 1000.0 / rate_mhz);
  }
  std::sort(ns.begin(), ns.end());
  return ns;
}

void add_responses_of(const Subject& subject, const SignalPoint& point, const PointResponses& responses,
                      double rate_mhz, std::vector<MeasuredFigure>& figures) {
  const auto delays = delays_of(subject, responses);
  const auto fired = std::count_if(delays.begin(), delays.end(), [](std::int32_t delay) { return delay >= 0; });
  const std::string tail = fmt::format(".{}.{}", subject.name, point.condition);
  figures.push_back({"efficiency" + tail, "", "", ProportionBasis{fired, static_cast<std::int64_t>(delays.size())}});
  const auto ns = delays_ns(delays, rate_mhz);
  figures.push_back({"delay_median" + tail, "ns",
                     "onset to first firing, of the signals that fired; the digitizer's pipeline comes on top",
                     QuantileBasis{ns, 0.5}});
  figures.push_back({"delay_p95" + tail, "ns",
                     "onset to first firing, of the signals that fired; the digitizer's pipeline comes on top",
                     QuantileBasis{ns, 0.95}});
}

std::vector<double> margins_of(std::size_t trigger, const PointResponses& responses) {
  std::vector<double> margins;
  for (const SignalResponse& response : responses.responses[trigger]) margins.push_back(response.margin);
  std::sort(margins.begin(), margins.end());
  return margins;
}

}  // namespace

std::vector<MeasuredFigure> signal_figures(const EfficiencyRun& run, const StationPlan& plan) {
  std::vector<MeasuredFigure> figures;
  const auto subjects = subjects_of(plan.triggers);
  for (std::size_t p = 0; p < run.points().size(); ++p) {
    const SignalPoint& point = run.points()[p];
    for (const Subject& subject : subjects) {
      add_responses_of(subject, point, run.responses(p), plan.digitizer.sample_rate_mhz, figures);
    }
    for (std::size_t t = 0; t < plan.triggers.size(); ++t) {
      figures.push_back({fmt::format("margin_median.{}.{}", plan.triggers[t].name, point.condition),
                         std::string(margin_unit(plan.triggers[t].condition.kind)),
                         "best of the trace; at least 0 fires", QuantileBasis{margins_of(t, run.responses(p)), 0.5}});
    }
  }
  return figures;
}

std::vector<PairedPoint> paired_points(const EfficiencyRun& run, const StationPlan& plan) {
  std::vector<PairedPoint> paired;
  if (!are_comparable(plan.triggers)) return paired;
  const auto subjects = subjects_of(plan.triggers);  // the two sets come first
  for (std::size_t p = 0; p < run.points().size(); ++p) {
    const auto in_service = delays_of(subjects[0], run.responses(p));
    const auto candidate = delays_of(subjects[1], run.responses(p));
    PairedPoint pair{&run.points()[p]};
    for (std::size_t i = 0; i < in_service.size(); ++i) {
      const bool old_fired = in_service[i] >= 0;
      const bool new_fired = candidate[i] >= 0;
      ++(old_fired ? (new_fired ? pair.both : pair.only_in_service) : (new_fired ? pair.only_candidate : pair.neither));
    }
    pair.p_value = mcnemar_exact(pair.only_in_service, pair.only_candidate);
    paired.push_back(pair);
  }
  return paired;
}

std::string p_value_text(double p_value) { return p_value < 1e-300 ? "< 1e-300" : fmt::format("{:.2g}", p_value); }

std::vector<MeasuredFigure> paired_figures(const std::vector<PairedPoint>& points) {
  std::vector<MeasuredFigure> figures;
  for (const PairedPoint& pair : points) {
    const std::int64_t all = pair.both + pair.only_in_service + pair.only_candidate + pair.neither;
    figures.push_back({"gain.candidate." + pair.point->condition, "",
                       "efficiency of the candidate less that in service, paired by signal",
                       PairedBasis{pair.only_candidate, pair.only_in_service, all}});
    figures.push_back({"p_value.candidate." + pair.point->condition, "",
                       "exact McNemar test, two-sided; one of many, so judge the smallest with care",
                       PlainBasis{pair.p_value}});
  }
  return figures;
}

}  // namespace cistern
