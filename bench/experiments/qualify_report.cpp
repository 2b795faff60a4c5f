/// \file
/// The report of a qualification, verdict first.
#include <fmt/format.h>

#include <algorithm>

#include "bench/experiments/qualify_results.hpp"
#include "bench/experiments/replay_report.hpp"
#include "bench/experiments/report_parts.hpp"
#include "bench/experiments/signal_figures.hpp"
#include "bench/experiments/signal_tables.hpp"
#include "bench/experiments/subjects.hpp"
#include "bench/statistics/intervals.hpp"
#include "bench/statistics/quantiles.hpp"

namespace cistern {
namespace {

enum class SignalAxis { Size, Spread };

double value_on(SignalAxis axis, const SignalPoint& point) {
  return axis == SignalAxis::Size ? point.test.size_vem : point.test.spread_ns;
}

/// Points of one [[signal]] at one value of the other axis.
std::vector<std::size_t> points_along(const EfficiencyRun& run, std::size_t signal, SignalAxis axis, double other) {
  std::vector<std::size_t> along;
  for (std::size_t p = 0; p < run.points().size(); ++p) {
    const SignalPoint& point = run.points()[p];
    if (point.signal == signal &&
        value_on(axis == SignalAxis::Size ? SignalAxis::Spread : SignalAxis::Size, point) == other)
      along.push_back(p);
  }
  return along;
}

ReportPoint efficiency_point(double x, const Subject& subject, const PointResponses& responses) {
  const auto delays = delays_of(subject, responses);
  const auto fired = std::count_if(delays.begin(), delays.end(), [](std::int32_t delay) { return delay >= 0; });
  const auto all = static_cast<std::int64_t>(delays.size());
  const Limits limits = clopper_pearson(fired, all, 0.95);
  return {x, static_cast<double>(fired) / static_cast<double>(std::max<std::int64_t>(all, 1)), limits.low, limits.high};
}

ReportChart efficiency_chart(const EfficiencyRun& run, const StationPlan& plan, const std::vector<std::size_t>& along,
                             SignalAxis axis) {
  ReportChart chart;
  chart.y = {"efficiency", AxisScale::Linear, 0, 1};
  chart.note =
      "Share of the placed signals on which the subject fires. Bars are exact 95 % limits (Clopper and Pearson).";
  for (const Subject& subject : distinct_subjects(plan.triggers)) {
    ReportSeries series{title_of(subject), {}};
    for (const std::size_t p : along)
      series.points.push_back(efficiency_point(value_on(axis, run.points()[p]), subject, run.responses(p)));
    chart.series.push_back(std::move(series));
  }
  return chart;
}

void add_efficiency_charts(const Scenario& scenario, const QualifyResults& results, std::vector<ReportBlock>& blocks) {
  for (std::size_t s = 0; s < scenario.signals.size(); ++s) {
    const SignalPlan& signal = scenario.signals[s];
    // Against size at the middle spread, against spread at the middle size.
    const double spread = signal.spreads_ns[signal.spreads_ns.size() / 2];
    const double size = signal.sizes_vem[signal.sizes_vem.size() / 2];
    if (signal.sizes_vem.size() > 1) {
      ReportChart chart =
          efficiency_chart(*results.signals, results.plan, points_along(*results.signals, s, SignalAxis::Size, spread),
                           SignalAxis::Size);
      chart.heading = fmt::format("Efficiency for {}, against size", signal.name);
      chart.note +=
          spread > 0 ? fmt::format(" Arrival times spread over {} ns (10 to 90 %).", spread) : " All light at once.";
      chart.x = {"true size (VEM)", AxisScale::Logarithmic, {}, {}};
      blocks.emplace_back(std::move(chart));
    }
    if (signal.spreads_ns.size() > 1) {
      ReportChart chart =
          efficiency_chart(*results.signals, results.plan, points_along(*results.signals, s, SignalAxis::Spread, size),
                           SignalAxis::Spread);
      chart.heading = fmt::format("Efficiency for {}, against spread", signal.name);
      chart.note += fmt::format(" True size {} VEM.", size);
      chart.x = {"spread of arrival times, 10 to 90 % (ns)", AxisScale::Linear, {}, {}};
      blocks.emplace_back(std::move(chart));
    }
  }
}

ReportTable paired_table(const std::vector<PairedPoint>& points) {
  ReportTable table;
  table.heading = "Candidate against in service, signal by signal";
  table.note =
      "Both stations saw the same traces; a signal counts as found when a first firing falls inside the match window "
      "after its onset. The p value is that of the "
      "exact McNemar test on the signals that only one of them found; with many rows the smallest should be judged "
      "with care.";
  table.columns = {
      {"signal", "", "", false},         {"both", "", "found by both", true},
      {"only in service", "", "", true}, {"only candidate", "", "", true},
      {"neither", "", "", true},         {"gain", "", "efficiency of the candidate less that in service", true},
      {"p value", "", "two-sided", true}};
  for (const PairedPoint& pair : points) {
    const auto all = static_cast<double>(
        std::max<std::int64_t>(1, pair.both + pair.only_in_service + pair.only_candidate + pair.neither));
    table.rows.push_back({pair.point->condition, std::to_string(pair.both), std::to_string(pair.only_in_service),
                          std::to_string(pair.only_candidate), std::to_string(pair.neither),
                          fmt::format("{:+.3f}", static_cast<double>(pair.only_candidate - pair.only_in_service) / all),
                          p_value_text(pair.p_value)});
  }
  return table;
}

/// One placed signal, for a picture.
struct Example {
  std::size_t point{0};
  std::int32_t index{0};
};

/// A signal that one station found and the other did not, of the kind where that happens most often.
std::optional<Example> find_example(const EfficiencyRun& run, const Subject& finds, const Subject& misses) {
  std::optional<Example> example;
  std::int64_t most = 0;
  for (std::size_t p = 0; p < run.points().size(); ++p) {
    const auto found = delays_of(finds, run.responses(p));
    const auto missed = delays_of(misses, run.responses(p));
    std::vector<std::int32_t> discordant;
    for (std::size_t i = 0; i < found.size(); ++i) {
      if (found[i] >= 0 && missed[i] < 0) discordant.push_back(static_cast<std::int32_t>(i));
    }
    if (static_cast<std::int64_t>(discordant.size()) <= most) continue;
    most = static_cast<std::int64_t>(discordant.size());
    example = Example{p, discordant.front()};
  }
  return example;
}

/// The member that fired first, else the first member.
std::size_t trigger_to_show(const EfficiencyRun& run, const Subject& subject, const Example& example) {
  std::size_t best = subject.members.front();
  std::int32_t best_delay = -1;
  for (const std::size_t member : subject.members) {
    const SignalResponse& response =
        run.responses(example.point).responses[member][static_cast<std::size_t>(example.index)];
    if (response.fired() && (best_delay < 0 || response.delay_samples < best_delay)) {
      best = member;
      best_delay = response.delay_samples;
    }
  }
  return best;
}

ReportTrace example_trace(const QualifyResults& results, const Subject& finds, const Subject& misses,
                          const Example& example) {
  constexpr std::int64_t shown_before = 60;
  constexpr std::int64_t shown_after = 260;
  const EfficiencyRun& run = *results.signals;
  const std::size_t t = trigger_to_show(run, finds, example);
  const TriggerSettings& trigger = results.plan.triggers[t];
  const Codes codes = run.codes_of(example.point, example.index);
  const std::int64_t onset = run.frame().onset;
  ReportTrace trace;
  trace.heading = fmt::format("A signal that only the {} finds", title_of(finds));
  trace.note = fmt::format("{}, signal {}: {} fires; the {} does not.", run.points()[example.point].condition,
                           example.index, trigger.name, title_of(misses));
  trace.sample_rate_mhz = results.plan.digitizer.sample_rate_mhz;
  trace.firing_sample =
      onset + run.responses(example.point).responses[t][static_cast<std::size_t>(example.index)].delay_samples;
  // Early enough for the whole window that ends in the firing.
  const std::int64_t window_start = *trace.firing_sample - reach_samples(trigger.condition);
  trace.first_sample = std::max<std::int64_t>(0, std::min(onset - shown_before, window_start - shown_before / 4));
  const auto last = std::min<std::int64_t>(static_cast<std::int64_t>(codes.samples()), onset + shown_after);
  for (std::size_t c = 0; c < codes.channels(); ++c) {
    const auto all = codes.channel(c);
    ReportTraceChannel channel{
        fmt::format("channel {}", c), {all.begin() + trace.first_sample, all.begin() + last}, {}, {}};
    channel.baseline = trigger.condition.baseline_counts[c];
    if (trigger.condition.kind != TriggerKind::BoxcarSum)
      channel.level = trigger.condition.baseline_counts[c] + trigger.condition.level_counts[c];
    trace.channels.push_back(std::move(channel));
  }
  trace.onset_sample = onset;
  if (reach_samples(trigger.condition) > 1) trace.window_samples = reach_samples(trigger.condition);
  trace.trigger = trigger.name;
  return trace;
}

void add_examples(const QualifyResults& results, std::vector<ReportBlock>& blocks) {
  if (!are_comparable(results.plan.triggers)) return;
  const auto subjects = subjects_of(results.plan.triggers);
  const Subject& in_service = subjects[0];
  const Subject& candidate = subjects[1];
  if (const auto example = find_example(*results.signals, candidate, in_service))
    blocks.emplace_back(example_trace(results, candidate, in_service, *example));
  if (const auto example = find_example(*results.signals, in_service, candidate))
    blocks.emplace_back(example_trace(results, in_service, candidate, *example));
}

ReportTable logic_table(const LogicCheck& logic) {
  ReportTable table;
  table.heading = "Logic at its boundaries";
  std::int64_t firings = 0;
  std::int64_t differences = 0;
  for (const LogicAgreement& agreement : logic.agreements) {
    firings += agreement.firings;
    differences += agreement.differences;
  }
  table.note = fmt::format(
      "The smallest stimuli on either side of each boundary, without noise. On random codes around the levels the fast "
      "kernels and the specification agree: "
      "{} firings, {} differences.",
      firings, differences);
  table.columns = {{"trigger", "", "", false},
                   {"stimulus", "", "", false},
                   {"should fire", "", "by its settings", false},
                   {"fired", "", "", false}};
  for (const LogicRow& row : logic.rows)
    table.rows.push_back({row.trigger, row.stimulus, row.should_fire ? "yes" : "no", row.fired ? "yes" : "no"});
  return table;
}

}  // namespace

Report qualify_report(const Scenario& scenario, const QualifyResults& results, const Summary& summary) {
  Report report = start_report(summary);
  auto& blocks = report.blocks;
  if (!scenario.identity.summary.empty())
    blocks.emplace_back(ReportText{"What is compared", {scenario.identity.summary}});
  if (results.signals) {
    add_efficiency_charts(scenario, results, blocks);
    const auto paired = paired_points(*results.signals, results.plan);
    if (!paired.empty()) blocks.emplace_back(paired_table(paired));
    add_examples(results, blocks);
  }
  if (results.scan) {
    for (ReportBlock& block : rate_charts(*results.scan, results.plan, results.facts))
      blocks.push_back(std::move(block));
    std::vector<Figure> own;  // the scan's points are in the chart above
    std::copy_if(summary.figures.begin(), summary.figures.end(), std::back_inserter(own),
                 [](const Figure& f) { return std::count(f.name.begin(), f.name.end(), '.') < 2; });
    blocks.emplace_back(figure_table(
        "Background",
        fmt::format("{:.4g} s of live time; a tag is sent for every capture.", results.background->live_time_s()), own,
        {"background_rate", "tag_rate", "busy_loss", "dead_time", "rate_slope"}));
  }
  if (results.recorded) {
    blocks.emplace_back(
        recorded_table(results.plan, results.recorded->counts, results.recorded->file.filename().string()));
    for (ReportChart& chart : margin_charts(results.plan, results.recorded->counts))
      blocks.emplace_back(std::move(chart));
  }
  if (results.signals) {
    const auto& points = results.signals->points();
    blocks.emplace_back(
        delay_table("Delay from onset to firing, median", "delay_median", results.plan, points, summary.figures));
    blocks.emplace_back(delay_table("Delay from onset to firing, 95 % of the signals", "delay_p95", results.plan,
                                    points, summary.figures));
    blocks.emplace_back(margin_table(results.plan, points, summary.figures));
  }
  blocks.emplace_back(logic_table(results.logic));
  blocks.emplace_back(trigger_table(results.plan));
  if (!summary.notes.empty()) blocks.emplace_back(notes_block(summary));
  return report;
}

}  // namespace cistern
