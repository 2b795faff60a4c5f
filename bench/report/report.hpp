#pragma once
/// \file
/// A report as plain blocks, and its rendering as one self-contained HTML file: verdict and tables
/// readable without scripting, charts drawn by the embedded script, nothing loaded from anywhere.
#include <cstdint>
#include <optional>
#include <string>
#include <variant>
#include <vector>

namespace cistern {

enum class VerdictState { Met, NotMet, Undecided, NoRequirements };

/// The first thing a reader sees.
struct ReportVerdict {
  VerdictState state{VerdictState::NoRequirements};
  std::string sentence;
  std::vector<std::string> points;  ///< short lines under it
};

struct ReportText {
  std::string heading;
  std::vector<std::string> paragraphs;
};

/// Printed with a frame: something that can hurt, or that a figure must not be used for.
struct ReportCaution {
  std::string text;
};

struct ReportColumn {
  std::string label;
  std::string unit;
  std::string meaning;  ///< a sentence; shown on hover and under the table in print
  bool is_number{false};
};

/// A cell whose text is "met", "not met" or "undecided" gets the mark of that verdict. A column without
/// any text is left out, and a long table is folded.
struct ReportTable {
  std::string heading;
  std::string note;
  std::vector<ReportColumn> columns;
  std::vector<std::vector<std::string>> rows;
};

enum class AxisScale { Linear, Logarithmic };

struct ReportAxis {
  std::string label;  ///< with its unit: "true size (VEM)"
  AxisScale scale{AxisScale::Linear};
  std::optional<double> low;  ///< fixed ends; chosen from the data where absent
  std::optional<double> high;
};

struct ReportPoint {
  double x{0};
  double y{0};
  std::optional<double> low;  ///< limits of y
  std::optional<double> high;
};

/// Markers, dashes and names tell series apart, colour only helps.
enum class SeriesDraw {
  Line,    ///< markers with their limits, joined
  Points,  ///< the same, not joined
  Step,    ///< y holds from its x to the next one; for counts and shares
  Band,    ///< the area from low to high
};

struct ReportSeries {
  std::string name;                 ///< has one look in all charts of a report
  std::vector<ReportPoint> points;  ///< a value that a logarithmic axis cannot show is left out; its high limit stays
  SeriesDraw draw{SeriesDraw::Line};
  std::string remark{};  ///< beside the name in the legend: "slope -3.1"
};

/// A straight marker across the chart.
struct ReportMarker {
  std::string label;
  double at{0};
  bool is_vertical{true};
};

struct ReportChart {
  std::string heading;
  std::string note;
  ReportAxis x;
  ReportAxis y;
  std::vector<ReportSeries> series;
  std::vector<ReportMarker> markers;
};

/// One channel of an example trace, in counts.
struct ReportTraceChannel {
  std::string name;
  std::vector<std::int16_t> codes;  ///< from `first_sample` on
  std::optional<double> level;      ///< absolute, baseline included
  std::optional<double> baseline{};
};

/// An example trace with the level, the window and the firing drawn in.
struct ReportTrace {
  std::string heading;
  std::string note;
  double sample_rate_mhz{100};
  std::int64_t first_sample{0};  ///< of the codes, within the trace
  std::vector<ReportTraceChannel> channels;
  std::optional<std::int64_t> onset_sample;
  std::optional<std::int64_t> firing_sample;
  std::optional<std::int64_t> window_samples;  ///< that end in the firing
  std::string trigger;
};

using ReportBlock = std::variant<ReportText, ReportCaution, ReportTable, ReportChart, ReportTrace>;

struct Report {
  std::string title;
  std::string subtitle;  ///< command, scenario, seed, version
  ReportVerdict verdict;
  std::vector<ReportBlock> blocks;
};

/// The whole file. Same report, same bytes.
[[nodiscard]] std::string render_report(const Report& report);

}  // namespace cistern
