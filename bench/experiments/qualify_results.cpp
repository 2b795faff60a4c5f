#include "bench/experiments/qualify_results.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "bench/experiments/live_figures.hpp"
#include "bench/experiments/replay_report.hpp"
#include "bench/experiments/report_parts.hpp"
#include "bench/experiments/signal_figures.hpp"
#include "bench/experiments/subjects.hpp"

namespace cistern {
namespace {

void append(std::vector<MeasuredFigure>& to, std::vector<MeasuredFigure> more) {
  std::move(more.begin(), more.end(), std::back_inserter(to));
}

MeasuredFigure logic_figure(const LogicCheck& logic) {
  const auto wrong = std::count_if(logic.rows.begin(), logic.rows.end(),
                                   [](const LogicRow& row) { return row.should_fire != row.fired; });
  std::int64_t differences = wrong;
  for (const LogicAgreement& agreement : logic.agreements) differences += agreement.differences;
  return {"logic_faults.all", "",
          "boundary stimuli answered wrongly, and differences between the fast kernels and the specification",
          PlainBasis{static_cast<double>(differences)}};
}

const Figure* find_figure(const Summary& summary, const std::string& name) {
  const auto found = std::find_if(summary.figures.begin(), summary.figures.end(),
                                  [&](const Figure& figure) { return figure.name == name; });
  return found == summary.figures.end() ? nullptr : &*found;
}

/// One line per subject: its background rate and where its efficiency passes one half.
std::vector<std::string> subject_lines(const QualifyResults& results, const Summary& summary) {
  std::vector<std::string> lines;
  for (const Subject& subject : subjects_of(results.plan.triggers)) {
    const std::string quantity = subject.is_set ? "tag_rate." : "background_rate.";
    if (const Figure* rate = find_figure(summary, quantity + subject.name); rate != nullptr && rate->value) {
      lines.push_back(fmt::format("  {:<12} {:<16} {}", subject.name, subject.is_set ? "tag rate" : "background rate",
                                  value_with_limits(*rate)));
    }
  }
  return lines;
}

std::vector<std::string> comparison_lines(const QualifyResults& results) {
  std::vector<std::string> lines;
  if (!results.signals) return lines;
  for (const PairedPoint& pair : paired_points(*results.signals, results.plan)) {
    const std::int64_t all = pair.both + pair.only_in_service + pair.only_candidate + pair.neither;
    const auto share = [&](std::int64_t fired) {
      return 100.0 * static_cast<double>(fired) / static_cast<double>(std::max<std::int64_t>(all, 1));
    };
    lines.push_back(fmt::format("  {:<30} {:>9.1f} % {:>9.1f} %  {:>+7.1f} %   p {}", pair.point->condition,
                                share(pair.both + pair.only_in_service), share(pair.both + pair.only_candidate),
                                share(pair.only_candidate - pair.only_in_service), p_value_text(pair.p_value)));
  }
  if (!lines.empty())
    lines.insert(lines.begin(), fmt::format("  {:<30} {:>11} {:>11}  {:>9}   exact McNemar", "efficiency", "in service",
                                            "candidate", "gain"));
  return lines;
}

}  // namespace

FiguresAndNotes measured_figures(const QualifyResults& results) {
  FiguresAndNotes all;
  if (results.background) {
    append(all.figures, background_figures(*results.background, results.plan));
    append(all.figures, scan_figures(*results.scan, results.plan));
    all.notes.push_back(synthetic_background_limits());
  }
  if (results.signals) {
    append(all.figures, signal_figures(*results.signals, results.plan));
    append(all.figures, paired_figures(paired_points(*results.signals, results.plan)));
  }
  if (results.recorded) {
    all.notes.insert(all.notes.end(), results.recorded->facts.notes.begin(), results.recorded->facts.notes.end());
    append(all.figures, recorded_figures(results.recorded->counts, results.recorded->facts, results.plan, all.notes));
  }
  all.figures.push_back(logic_figure(results.logic));
  all.notes.insert(all.notes.end(), results.logic.warnings.begin(), results.logic.warnings.end());
  return all;
}

std::vector<std::string> qualify_lines(const QualifyResults& results, const Summary& summary) {
  std::vector<std::string> lines = verdict_lines(summary);
  const auto add = [&](const std::vector<std::string>& more) {
    if (more.empty()) return;
    lines.emplace_back();
    lines.insert(lines.end(), more.begin(), more.end());
  };
  add(subject_lines(results, summary));
  add(comparison_lines(results));
  if (results.recorded) {
    add(recorded_lines(results.plan, results.recorded->counts, results.recorded->file.filename().string()));
  }
  add({fmt::format(
      "  logic: {} boundary stimuli, {} firings against the specification: {}", results.logic.rows.size(),
      [&] {
        std::int64_t firings = 0;
        for (const LogicAgreement& agreement : results.logic.agreements) firings += agreement.firings;
        return firings;
      }(),
      results.logic.passed() ? "all as the settings say" : "NOT as the settings say")});
  for (const std::string& note : summary.notes) lines.push_back("  note: " + note);
  lines.emplace_back();
  return lines;
}

}  // namespace cistern
