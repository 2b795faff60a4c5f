/// \file
/// `cistern qualify`: plans the run and judges it; each question it asks has a file of its own.
#include <fmt/format.h>

#include <memory>

#include "bench/experiments/qualify_results.hpp"
#include "bench/experiments/run_options.hpp"
#include "bench/experiments/run_record.hpp"
#include "bench/report/report.hpp"
#include "bench/results/run_directory.hpp"

namespace cistern {
namespace {

constexpr std::int64_t firing_rows_per_trigger = 100'000;

/// A run from its plan to its figures. Parts that the scenario has nothing for stay absent.
class Qualification {
 public:
  Qualification(const Scenario& scenario, const RunOptions& options) : scenario_(scenario), options_(options) {
    prepare_recorded();
    results_.plan = plan_station(scenario, results_.recorded ? results_.recorded->facts.station : facts_of(scenario));
    results_.facts = results_.recorded ? results_.recorded->facts.station : facts_of(scenario);
    if (results_.recorded) results_.recorded->counts.triggers.resize(results_.plan.triggers.size());
    if (scenario.has_tank) prepare_synthetic();
    check_requirements();
  }

  RunOutcome run() {
    RunDirectory directory(options_.out, identity_of("qualify", scenario_, options_));
    RunOutcome outcome;
    outcome.directory = directory.path();
    results_.logic = check_logic(results_.plan, seed_of(scenario_, options_));
    outcome.interrupted = !(run_signals(directory) && run_live_time(directory) && run_recorded());
    if (outcome.interrupted) {
      directory.keep_unfinished();
      return outcome;
    }
    conclude(outcome);
    directory.write_file("report.html", render_report(qualify_report(scenario_, results_, outcome.summary)));
    directory.finish(outcome.summary);
    return outcome;
  }

 private:
  void prepare_recorded() {
    const auto file = options_.traces ? options_.traces : scenario_.traces.file;
    if (!file) return;
    results_.recorded.emplace();
    results_.recorded->file = *file;
    reader_ = open_trace_file(*file);
    reader_->expect_bits(scenario_.digitizer.bits);
    results_.recorded->facts = reconcile(scenario_, reader_->info(), file->string());
  }

  void prepare_synthetic() {
    const bool quick = options_.effort == Effort::Quick;
    const QualifyConfig& config = scenario_.qualify;
    results_.generator = std::make_unique<TraceGenerator>(scenario_.generator, seed_of(scenario_, options_));
    results_.signals =
        std::make_unique<EfficiencyRun>(results_.plan, config, *results_.generator, signal_points(scenario_.signals),
                                        quick ? config.quick_signals_per_point : config.signals_per_point);
    results_.time = std::make_unique<LiveTimePlan>(quick ? config.quick_live_time_s : config.live_time_s,
                                                   config.block_s, results_.plan);
    results_.background = std::make_unique<BackgroundRun>(results_.plan, scenario_.capture, *results_.time);
    results_.scan = std::make_unique<RateScan>(rate_variants(results_.plan, scenario_.rate), *results_.time);
  }

  /// The figures of the empty run have the same names: a requirement on another one is refused now.
  void check_requirements() const {
    std::vector<std::string> names;
    for (const MeasuredFigure& figure : measured_figures(results_).figures) names.push_back(figure.name);
    check_figures_exist(scenario_.requirements, names);
  }

  bool run_signals(RunDirectory& directory) {
    if (!results_.signals) return true;
    CampaignPlan plan{results_.signals->units(), [this](std::int64_t unit) { return results_.signals->work(unit); },
                      [this](std::int64_t unit, std::string_view result) { results_.signals->merge(unit, result); }};
    return run_campaign(plan, kept_campaign(directory, "test signals", options_)) == CampaignEnd::Complete;
  }

  bool run_live_time(RunDirectory& directory) {
    if (!results_.background) return true;
    directory.make_table(RowTable::Firings);
    std::vector<std::int64_t> rows(results_.plan.triggers.size(), 0);
    const auto keep_row = [&](std::size_t trigger, const Firing& firing) {
      if (++rows[trigger] > firing_rows_per_trigger) return;
      directory.add_firing({0,
                            results_.plan.triggers[trigger].name,
                            firing.sample,
                            {},
                            firing.onset_sample,
                            std::string(name_of(firing.status)),
                            firing.start_unknown});
    };
    CampaignPlan plan{results_.time->units(), [this](std::int64_t unit) { return work_live_unit(unit); },
                      [&](std::int64_t unit, std::string_view result) {
                        const auto seen = unpack_observed(result, 2);
                        results_.background->merge(unit, seen[0], keep_row);
                        results_.scan->merge(seen[1]);
                      }};
    const auto end = run_campaign(plan, kept_campaign(directory, "background", options_));
    note_cut_rows(rows);
    return end == CampaignEnd::Complete;
  }

  std::string work_live_unit(std::int64_t unit) const {
    std::vector<std::unique_ptr<LiveObserver>> observers;
    observers.push_back(results_.background->observe(unit));
    observers.push_back(results_.scan->observe(unit));
    return observe_live_unit(results_.plan, *results_.generator, *results_.time, unit, std::move(observers));
  }

  void note_cut_rows(const std::vector<std::int64_t>& rows) {
    for (std::size_t t = 0; t < rows.size(); ++t) {
      if (rows[t] <= firing_rows_per_trigger) continue;
      results_.notes.push_back(fmt::format("{} fired {} times on background; the firings table holds the first {}",
                                           results_.plan.triggers[t].name, rows[t], firing_rows_per_trigger));
    }
  }

  bool run_recorded() {
    if (!results_.recorded) return true;
    RecordedTally tally(results_.recorded->counts, results_.plan.triggers);
    RecordedSink sink;
    sink.firing = [&](std::int64_t, std::optional<GpsNanoseconds>, std::size_t trigger, const Firing& firing) {
      tally.take(trigger, firing.status);
    };
    sink.end_of_trace = [&](const RecordedTrace& trace) {
      tally.end_trace(trace);
      if (options_.advance) options_.advance("recorded traces", trace.trace + 1, reader_->info().traces.value_or(0));
    };
    sink.stop = [this] { return wants_stop(options_); };
    return scan_recorded(*reader_, results_.plan.triggers, results_.recorded->facts.contiguous, sink);
  }

  void conclude(RunOutcome& outcome) {
    outcome.summary = start_summary("qualify", scenario_, options_);
    const FiguresAndNotes measured = measured_figures(results_);
    for (const MeasuredFigure& figure : measured.figures) outcome.summary.figures.push_back(figure_of(figure));
    outcome.summary.notes = results_.notes;
    outcome.summary.notes.insert(outcome.summary.notes.end(), measured.notes.begin(), measured.notes.end());
    outcome.summary.requirements = judge_all(scenario_.requirements, measured.figures);
    outcome.summary.verdict = overall_verdict(outcome.summary.requirements);
    outcome.lines = qualify_lines(results_, outcome.summary);
  }

  const Scenario& scenario_;
  const RunOptions& options_;
  std::unique_ptr<TraceReader> reader_;
  QualifyResults results_;
};

}  // namespace

RunOutcome run_qualify(const Scenario& scenario, const RunOptions& options) {
  return Qualification(scenario, options).run();
}

}  // namespace cistern
