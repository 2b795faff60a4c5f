#include "bench/experiments/signal_tables.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "bench/experiments/measured.hpp"
#include "bench/experiments/subjects.hpp"
#include "firmware_model/trigger/margin.hpp"

namespace cistern {
namespace {

constexpr std::string_view nothing = "-";

std::string cell_text(const Figure& figure) {
  if (!figure.value) return std::string(nothing);
  if (!figure.low || !figure.high) return number_text(*figure.value);
  return fmt::format("{} ({} to {})", number_text(*figure.value), number_text(*figure.low), number_text(*figure.high));
}

std::string cell_of(const std::vector<Figure>& figures, const std::string& name) {
  const auto found = std::find_if(figures.begin(), figures.end(), [&](const Figure& f) { return f.name == name; });
  return found == figures.end() ? std::string(nothing) : cell_text(*found);
}

/// A row per point with the figure `quantity`.SUBJECT.CONDITION of every subject.
std::vector<std::vector<std::string>> rows_of(const std::string& quantity, const std::vector<std::string>& subjects,
                                              const std::vector<SignalPoint>& points,
                                              const std::vector<Figure>& figures) {
  std::vector<std::vector<std::string>> rows;
  for (const SignalPoint& point : points) {
    std::vector<std::string> row{point.condition};
    for (const std::string& subject : subjects) {
      row.push_back(cell_of(figures, fmt::format("{}.{}.{}", quantity, subject, point.condition)));
    }
    rows.push_back(std::move(row));
  }
  return rows;
}

bool says_nothing(const std::vector<std::string>& row) {
  return std::all_of(row.begin() + 1, row.end(), [](const std::string& cell) { return cell == nothing; });
}

}  // namespace

ReportTable delay_table(const std::string& heading, const std::string& quantity, const StationPlan& plan,
                        const std::vector<SignalPoint>& points, const std::vector<Figure>& figures) {
  ReportTable table;
  table.heading = heading;
  table.note =
      "From onset to first firing, of the signals that fired; the digitizer's pipeline comes on top. In brackets "
      "two-sided 95 % limits, where there are signals enough for them. Signals on which nobody fired are left out.";
  table.columns = {{"signal", "", "", false}};
  std::vector<std::string> names;
  for (const Subject& subject : distinct_subjects(plan.triggers)) {
    names.push_back(subject.name);
    table.columns.push_back({title_of(subject), "ns", "", true});
  }
  table.rows = rows_of(quantity, names, points, figures);
  table.rows.erase(std::remove_if(table.rows.begin(), table.rows.end(), says_nothing), table.rows.end());
  return table;
}

ReportTable margin_table(const StationPlan& plan, const std::vector<SignalPoint>& points,
                         const std::vector<Figure>& figures) {
  ReportTable table;
  table.heading = "Margins of test signals";
  table.note =
      "Half of the traces come at least this close to a firing; at least 0 fires. In brackets two-sided 95 % limits.";
  table.columns = {{"signal", "", "", false}};
  std::vector<std::string> names;
  for (const TriggerSettings& trigger : plan.triggers) {
    names.push_back(trigger.name);
    table.columns.push_back({trigger.name, std::string(margin_unit(trigger.condition.kind)), "", true});
  }
  table.rows = rows_of("margin_median", names, points, figures);
  return table;
}

}  // namespace cistern
