#pragma once
/// \file
/// Everything one qualification found out, and what is made of it: figures, lines and a report.
#include <filesystem>
#include <memory>
#include <optional>
#include <string>
#include <vector>

#include "bench/experiments/background.hpp"
#include "bench/experiments/efficiency.hpp"
#include "bench/experiments/logic_check.hpp"
#include "bench/experiments/measured.hpp"
#include "bench/experiments/rate_scan.hpp"
#include "bench/experiments/recorded_counts.hpp"
#include "bench/report/report.hpp"

namespace cistern {

struct RecordedPart {
  std::filesystem::path file;
  RecordedFacts facts;
  RecordedCounts counts;
};

/// Parts that the scenario has nothing for are absent.
struct QualifyResults {
  StationPlan plan;
  StationFacts facts;
  std::unique_ptr<TraceGenerator> generator;
  std::unique_ptr<EfficiencyRun> signals;
  std::unique_ptr<LiveTimePlan> time;
  std::unique_ptr<BackgroundRun> background;
  std::unique_ptr<RateScan> scan;
  std::optional<RecordedPart> recorded;
  LogicCheck logic;
  std::vector<std::string> notes;
};

struct FiguresAndNotes {
  std::vector<MeasuredFigure> figures;
  std::vector<std::string> notes;
};

/// All figures in the order of the summary. Of an empty run the names are already right.
[[nodiscard]] FiguresAndNotes measured_figures(const QualifyResults& results);

/// The result for a terminal, the verdict first.
[[nodiscard]] std::vector<std::string> qualify_lines(const QualifyResults& results, const Summary& summary);

[[nodiscard]] Report qualify_report(const Scenario& scenario, const QualifyResults& results, const Summary& summary);

}  // namespace cistern
