/// \file
/// `cistern replay`: which triggers fire on recorded traces, where, and by what margin.
#include <fmt/format.h>

#include "bench/experiments/recorded.hpp"
#include "bench/experiments/recorded_counts.hpp"
#include "bench/experiments/replay_report.hpp"
#include "bench/experiments/run_options.hpp"
#include "bench/experiments/run_record.hpp"
#include "bench/experiments/trigger_sets.hpp"
#include "bench/results/run_directory.hpp"
#include "firmware_model/station/capture_book.hpp"
#include "traces/base/time.hpp"

namespace cistern {
namespace {

/// The last stage of a firing, where the scenario describes the station's buffers. One book for the
/// station in service, one for the candidate; a trigger of both is judged by the first.
class BusyStage {
 public:
  explicit BusyStage(const Scenario& scenario) : scenario_(scenario) { start_trace(); }

  void start_trace() {
    books_.clear();
    for (std::size_t i = 0; scenario_.has_station && i < trigger_sets.size(); ++i)
      books_.emplace_back(scenario_.capture);
  }

  FiringStatus pass(const TriggerSettings& trigger, const Firing& firing) {
    if (books_.empty() || firing.status != FiringStatus::Passed) return firing.status;
    bool first_is_busy = false;
    bool is_first = true;
    for (const TriggerSet set : trigger_sets) {
      if (!belongs_to(trigger, set)) continue;
      const auto outcome = books_[static_cast<std::size_t>(set)].take(firing.sample).outcome;
      if (is_first) first_is_busy = outcome == CaptureOutcome::NoFreeBuffer;
      is_first = false;
    }
    return first_is_busy ? FiringStatus::Busy : FiringStatus::Passed;
  }

 private:
  const Scenario& scenario_;
  std::vector<CaptureBook> books_;
};

/// Rows and counts of one replay.
class Replay {
 public:
  Replay(const Scenario& scenario, const StationPlan& plan, bool contiguous, RunDirectory& directory)
      : rate_mhz_(scenario.digitizer.sample_rate_mhz),
        contiguous_(contiguous),
        triggers_(plan.triggers),
        busy_(scenario),
        directory_(directory),
        tally_(counts_, triggers_) {
    directory_.make_table(RowTable::Firings);
    directory_.make_table(RowTable::Margins);
  }

  void take_firing(std::int64_t trace, std::optional<GpsNanoseconds> start_ns, std::size_t trigger,
                   const Firing& firing) {
    const FiringStatus status = busy_.pass(triggers_[trigger], firing);
    FiringRow row;
    row.trace = trace;
    row.trigger = triggers_[trigger].name;
    row.sample = firing.sample;
    if (start_ns) row.time_ns = *start_ns + sample_offset_ns(firing.sample, rate_mhz_);
    row.onset_sample = firing.onset_sample;
    row.status = name_of(status);
    row.start_unknown = firing.start_unknown && !contiguous_;
    directory_.add_firing(row);
    tally_.take(trigger, status);
  }

  void end_trace(const RecordedTrace& trace) {
    for (std::size_t t = 0; t < triggers_.size(); ++t) {
      if (const auto& best = trace.margins[t]) {
        directory_.add_margin({trace.trace, triggers_[t].name, best->sample, best->margin,
                               std::string(margin_unit(triggers_[t].condition.kind))});
      }
    }
    tally_.end_trace(trace);
    if (!contiguous_) busy_.start_trace();
  }

  [[nodiscard]] const RecordedCounts& counts() const noexcept { return counts_; }

 private:
  double rate_mhz_;
  bool contiguous_;
  const std::vector<TriggerSettings>& triggers_;
  BusyStage busy_;
  RunDirectory& directory_;
  RecordedCounts counts_;
  RecordedTally tally_;
};

}  // namespace

std::filesystem::path trace_file_of(const Scenario& scenario, const RunOptions& options, std::string_view command) {
  if (options.traces) return *options.traces;
  if (scenario.traces.file) return *scenario.traces.file;
  throw InputError(scenario.path.string(),
                   fmt::format("`{}` needs recorded traces; expected --traces FILE or [traces] file", command));
}

RunOutcome run_replay(const Scenario& scenario, const RunOptions& options) {
  const auto file = trace_file_of(scenario, options, "replay");
  const auto reader = open_trace_file(file);
  const RecordedFacts facts = reconcile(scenario, reader->info(), file.string());
  reader->expect_bits(scenario.digitizer.bits);
  const StationPlan plan = plan_station(scenario, facts.station);

  RunDirectory directory(options.out, identity_of("replay", scenario, options));
  Replay replay(scenario, plan, facts.contiguous, directory);
  RecordedSink sink;
  sink.firing = [&](std::int64_t trace, std::optional<GpsNanoseconds> start_ns, std::size_t trigger,
                    const Firing& firing) { replay.take_firing(trace, start_ns, trigger, firing); };
  sink.end_of_trace = [&](const RecordedTrace& trace) {
    replay.end_trace(trace);
    if (options.advance) options.advance("traces", trace.trace + 1, reader->info().traces.value_or(0));
  };
  sink.stop = [&] { return wants_stop(options); };

  RunOutcome outcome;
  outcome.directory = directory.path();
  outcome.interrupted = !scan_recorded(*reader, plan.triggers, facts.contiguous, sink);
  if (outcome.interrupted) {
    directory.keep_unfinished();
    return outcome;
  }
  outcome.summary = start_summary("replay", scenario, options);
  outcome.summary.notes = facts.notes;
  const auto figures = recorded_figures(replay.counts(), facts, plan, outcome.summary.notes);
  for (const MeasuredFigure& figure : figures) outcome.summary.figures.push_back(figure_of(figure));
  outcome.summary.requirements = judge_all(scenario.requirements, figures);
  outcome.summary.verdict = overall_verdict(outcome.summary.requirements);
  outcome.lines = replay_lines(plan, replay.counts(), file.filename().string(), outcome.summary);
  directory.write_file("report.html",
                       render_report(replay_report(plan, replay.counts(), file.filename().string(), outcome.summary)));
  directory.finish(outcome.summary);
  return outcome;
}

}  // namespace cistern
