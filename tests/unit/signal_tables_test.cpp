#include "bench/experiments/signal_tables.hpp"

#include <gtest/gtest.h>

namespace cistern {
namespace {

TriggerSettings trigger_of(const std::string& name, TriggerRole role, TriggerKind kind) {
  TriggerSettings settings;
  settings.name = name;
  settings.role = role;
  settings.condition.kind = kind;
  return settings;
}

StationPlan plan_of_three() {
  StationPlan plan;
  plan.triggers = {trigger_of("tall", TriggerRole::InService, TriggerKind::Threshold),
                   trigger_of("broad", TriggerRole::InService, TriggerKind::BoxcarSum),
                   trigger_of("long", TriggerRole::Candidate, TriggerKind::TimeOverThreshold)};
  return plan;
}

std::vector<SignalPoint> points_of(const std::vector<std::string>& conditions) {
  std::vector<SignalPoint> points;
  for (const std::string& condition : conditions) points.push_back({0, {}, condition});
  return points;
}

Figure figure(const std::string& name, std::optional<double> value, std::optional<double> low = {},
              std::optional<double> high = {}) {
  return {name, value, low, high, {}, {}, "ns", ""};
}

std::vector<std::string> labels_of(const ReportTable& table) {
  std::vector<std::string> labels;
  for (const ReportColumn& column : table.columns) labels.push_back(column.label);
  return labels;
}

using Row = std::vector<std::string>;

TEST(SignalTables, a_trigger_that_is_a_whole_station_has_no_column_of_its_own) {
  const ReportTable table = delay_table("Delay", "delay_median", plan_of_three(), {}, {});
  EXPECT_EQ(labels_of(table), (Row{"signal", "station in service", "station with the candidate", "tall", "broad"}));
}

TEST(SignalTables, every_signal_has_one_row_with_the_limits_in_brackets) {
  const std::vector<Figure> figures{
      figure("delay_median.in_service.muon.2_vem", 50, 40, 60), figure("delay_median.candidate.muon.2_vem", 220),
      figure("delay_median.tall.muon.2_vem", {}), figure("delay_p95.broad.muon.2_vem", 900, 800, 1000)};
  const ReportTable table = delay_table("Delay", "delay_median", plan_of_three(), points_of({"muon.2_vem"}), figures);
  ASSERT_EQ(table.rows.size(), 1U);
  EXPECT_EQ(table.rows[0], (Row{"muon.2_vem", "50 (40 to 60)", "220", "-", "-"}));
}

TEST(SignalTables, a_signal_on_which_nobody_fired_has_no_delay) {
  const std::vector<Figure> figures{figure("delay_median.in_service.muon.1_vem", {}),
                                    figure("delay_median.tall.muon.2_vem", 50, 40, 60)};
  const ReportTable table =
      delay_table("Delay", "delay_median", plan_of_three(), points_of({"muon.1_vem", "muon.2_vem"}), figures);
  ASSERT_EQ(table.rows.size(), 1U);
  EXPECT_EQ(table.rows[0].front(), "muon.2_vem");
}

TEST(SignalTables, margins_have_a_column_per_trigger_in_its_unit) {
  const std::vector<Figure> figures{figure("margin_median.long.muon.2_vem", -3, -4, -2)};
  const ReportTable table = margin_table(plan_of_three(), points_of({"muon.2_vem"}), figures);
  EXPECT_EQ(labels_of(table), (Row{"signal", "tall", "broad", "long"}));
  EXPECT_EQ(table.columns[1].unit, "counts");
  EXPECT_EQ(table.columns[3].unit, "samples");
  EXPECT_EQ(table.rows, (std::vector<Row>{{"muon.2_vem", "-", "-", "-3 (-4 to -2)"}}));
}

}  // namespace
}  // namespace cistern
