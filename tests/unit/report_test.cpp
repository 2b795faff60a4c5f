#include "bench/report/report.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <limits>
#include <nlohmann/json.hpp>
#include <string>

#include "bench/report/embedded.hpp"
#include "bench/report/html_text.hpp"
#include "bench/report/picture_data.hpp"
#include "bench/report/table_html.hpp"

namespace cistern {
namespace {

constexpr const char* hostile = "</script><img src=x onerror=\"a()\">'&";
constexpr const char* hostile_escaped = "&lt;/script&gt;&lt;img src=x onerror=&quot;a()&quot;&gt;&#39;&amp;";

ReportChart small_chart(const std::string& series_name) {
  ReportChart chart;
  chart.heading = "A chart";
  chart.x = {"size (VEM)", AxisScale::Logarithmic, {}, {}};
  chart.y = {"efficiency", AxisScale::Linear, 0, 1};
  chart.series = {{series_name, {{1.5, 0.375, 0.25, 0.5}, {2.5, 0.875, {}, {}}}}};
  chart.markers = {{"bound", 0.9, false}};
  return chart;
}

ReportTrace small_trace() {
  ReportTrace trace;
  trace.heading = "A trace";
  trace.first_sample = 40;
  trace.channels = {{"channel 0", {201, 263, 202}, 224.0, 200.0}, {"channel 1", {198, 255, 199}, {}}};
  trace.onset_sample = 41;
  trace.firing_sample = 42;
  trace.window_samples = 2;
  trace.trigger = "long";
  return trace;
}

Report full_report() {
  Report report;
  report.title = "A title";
  report.subtitle = "a command and a seed";
  report.verdict = {VerdictState::NotMet, "Not met: a sentence.", {"a point"}};
  report.blocks = {
      ReportText{"A text", {"first paragraph", "second paragraph"}},
      ReportCaution{"mind the battery"},
      ReportTable{"A table",
                  "a note",
                  {{"requirement", "", "", false}, {"verdict", "", "the outcome", false}},
                  {{"quiet", "met"}}},
      small_chart("long"),
      small_trace(),
  };
  return report;
}

/// What a reader without scripting gets: everything before the data and the script.
std::string without_script(const std::string& page) { return page.substr(0, page.find("<script")); }

bool holds(const std::string& page, const std::string& text) { return page.find(text) != std::string::npos; }

std::size_t times(const std::string& page, const std::string& text) {
  std::size_t count = 0;
  for (auto at = page.find(text); at != std::string::npos; at = page.find(text, at + text.size())) ++count;
  return count;
}

nlohmann::json pictures_of(const Report& report) { return nlohmann::json::parse(picture_data(report)); }

TEST(Report, shows_every_block_without_scripting) {
  const std::string page = without_script(render_report(full_report()));
  for (const char* text : {"<h1>A title</h1>", "a command and a seed", "Not met: a sentence.", "<li>a point</li>",
                           "first paragraph", "second paragraph", "mind the battery", ">A table</h2>", "a note",
                           "<td>quiet</td>", "<dd>the outcome</dd>", ">A chart</h2>", ">A trace</h2>"}) {
    EXPECT_TRUE(holds(page, text)) << text;
  }
}

TEST(Report, puts_the_verdict_before_all_blocks) {
  const std::string page = render_report(full_report());
  EXPECT_LT(page.find("Not met: a sentence."), page.find("<h2"));
}

TEST(Report, gives_each_state_of_the_verdict_a_symbol_of_its_own) {
  struct Row {
    VerdictState state;
    const char* expected;
  };
  const Row rows[] = {
      {VerdictState::Met,
       "verdict met\" aria-label=\"verdict\">\n<span class=\"symbol\" aria-hidden=\"true\">&#10003;"},
      {VerdictState::NotMet,
       "verdict not-met\" aria-label=\"verdict\">\n<span class=\"symbol\" aria-hidden=\"true\">&#10007;"},
      {VerdictState::Undecided,
       "verdict undecided\" aria-label=\"verdict\">\n<span class=\"symbol\" aria-hidden=\"true\">?"},
      {VerdictState::NoRequirements,
       "verdict none\" aria-label=\"verdict\">\n<span class=\"symbol\" aria-hidden=\"true\">&#8211;"}};
  for (const Row& row : rows) {
    Report report;
    report.verdict.state = row.state;
    EXPECT_TRUE(holds(render_report(report), row.expected)) << row.expected;
  }
}

TEST(Report, lists_the_numbers_of_a_chart) {
  const std::string page = without_script(render_report(full_report()));
  EXPECT_TRUE(holds(page,
                    "<tr><td>long</td><td class=\"number\">1.5</td><td class=\"number\">0.375</td>"
                    "<td class=\"number\">0.25</td><td class=\"number\">0.5</td></tr>"));
}

TEST(Report, lists_the_codes_of_a_trace_by_sample) {
  const std::string page = without_script(render_report(full_report()));
  EXPECT_TRUE(holds(page, "<td class=\"number\">41</td><td class=\"number\">263</td><td class=\"number\">255</td>"));
}

TEST(Report, says_in_words_what_is_drawn_in_a_trace) {
  const std::string page = without_script(render_report(full_report()));
  for (const char* text : {"Onset (dotted) at sample 41.", "Trigger long fires (thick line) at sample 42.",
                           "Its window of 2 samples is grey.", "channel 0 224;", "starts at sample 40, at 100 MHz"}) {
    EXPECT_TRUE(holds(page, text)) << text;
  }
}

TEST(Report, names_every_picture_for_those_who_hear_it) {
  const std::string page = render_report(full_report());
  EXPECT_TRUE(
      holds(page, "data-picture=\"0\" role=\"img\" aria-label=\"Chart of efficiency against size (VEM), for long\""));
  EXPECT_TRUE(holds(page, "data-picture=\"1\" role=\"img\" aria-label=\"A trace\""));
}

TEST(Report, has_the_same_bytes_for_the_same_report) {
  EXPECT_EQ(render_report(full_report()), render_report(full_report()));
}

TEST(Report, loads_nothing_and_forbids_it) {
  const std::string page = render_report(full_report());
  EXPECT_TRUE(holds(page, "default-src 'none'"));
  const std::string head_and_body = without_script(page);
  for (const char* text : {"http:", "https:", "//", "src=", "url(", "@import"})
    EXPECT_FALSE(holds(head_and_body, text)) << text;
  EXPECT_EQ(times(head_and_body, "href=\""), 1 + times(head_and_body, "href=\"#"))
      << "only the empty icon and links within";
}

TEST(Report, keeps_the_script_in_one_element) {
  EXPECT_FALSE(holds(std::string(report_script()), "</script"));
  EXPECT_FALSE(holds(std::string(report_script()), "<!--"));
  EXPECT_FALSE(holds(std::string(report_style()), "</style"));
  EXPECT_GT(report_script().size(), 100'000U) << "the script that draws is missing";
}

Report hostile_report() {
  Report report;
  report.title = report.subtitle = hostile;
  report.verdict = {VerdictState::Met, hostile, {hostile}};
  ReportChart chart = small_chart(hostile);
  chart.heading = chart.note = chart.x.label = chart.y.label = chart.series[0].remark = chart.markers[0].label =
      hostile;
  ReportTrace trace = small_trace();
  trace.heading = trace.note = trace.trigger = trace.channels[0].name = hostile;
  report.blocks = {ReportText{hostile, {hostile}}, ReportCaution{hostile},
                   ReportTable{hostile, hostile, {{hostile, hostile, hostile, false}}, {{hostile}}}, chart, trace};
  return report;
}

TEST(Report, lets_no_text_become_markup) {
  const std::string page = render_report(hostile_report());
  EXPECT_FALSE(holds(page, hostile));
  EXPECT_FALSE(holds(page, "<img"));
  EXPECT_TRUE(holds(page, std::string("<h1>") + hostile_escaped + "</h1>"));
  EXPECT_EQ(times(page, "</script"), 2U) << "that of the data and that of the script";
}

TEST(Report, gives_equal_headings_different_anchors) {
  Report report;
  report.blocks = {ReportText{"Same", {}}, ReportText{"Same", {}}, ReportText{"Same 2", {}}};
  const std::string page = render_report(report);
  for (const char* id : {"id=\"same\"", "id=\"same-2\"", "id=\"same-2-2\""}) EXPECT_EQ(times(page, id), 1U) << id;
  EXPECT_TRUE(holds(page, "<a href=\"#same-2-2\">Same 2</a>"));
}

TEST(ReportTable, marks_the_words_of_a_verdict) {
  const std::string html =
      table_html({{"verdict", "", "", false}}, {{"met"}, {"not met"}, {"undecided"}, {"metre"}}, "");
  EXPECT_TRUE(holds(html, "mark met\"><span aria-hidden=\"true\">&#10003;</span> met"));
  EXPECT_TRUE(holds(html, "mark not-met\"><span aria-hidden=\"true\">&#10007;</span> not met"));
  EXPECT_TRUE(holds(html, "mark undecided\"><span aria-hidden=\"true\">?</span> undecided"));
  EXPECT_TRUE(holds(html, "<td>metre</td>"));
}

TEST(ReportTable, leaves_out_columns_without_text) {
  const std::vector<ReportColumn> columns{{"kept", "", "", false}, {"empty", "", "", false}, {"short", "", "", true}};
  const std::string html = table_html(columns, {{"a", ""}, {"b", "", "7"}}, "");
  EXPECT_TRUE(holds(html, "kept"));
  EXPECT_FALSE(holds(html, "empty"));
  EXPECT_TRUE(holds(html, "<tr><td>a</td><td class=\"number\"></td></tr>"));
}

TEST(ReportTable, says_that_it_has_no_rows) {
  const std::string html = table_html({{"a", "", "", false}, {"b", "", "", false}}, {}, "");
  EXPECT_TRUE(holds(html, "<td colspan=\"2\">no rows</td>"));
}

TEST(ReportTable, is_folded_beyond_sixty_rows) {
  ReportTable table{"Long", "", {{"row", "", "", true}}, std::vector<std::vector<std::string>>(60, {"1"})};
  EXPECT_FALSE(holds(block_table_html(table), "<details"));
  table.rows.push_back({"1"});
  EXPECT_TRUE(holds(block_table_html(table), "<details class=\"long\"><summary>61 rows, folded</summary>"));
}

TEST(ReportData, keeps_the_look_of_a_name_in_all_charts) {
  Report report;
  report.blocks = {small_chart("long"), small_chart("tall"), small_chart("tall"), small_chart("long")};
  const auto pictures = pictures_of(report);
  EXPECT_EQ(pictures[0]["series"][0]["look"], 0);
  EXPECT_EQ(pictures[1]["series"][0]["look"], 1);
  EXPECT_EQ(pictures[2]["series"][0]["look"], 1);
  EXPECT_EQ(pictures[3]["series"][0]["look"], 0);
}

TEST(ReportData, numbers_pictures_as_the_page_does) {
  Report report;
  report.blocks = {small_trace(), ReportText{"between", {}}, small_chart("long")};
  const auto pictures = pictures_of(report);
  EXPECT_EQ(pictures[0]["kind"], "trace");
  EXPECT_EQ(pictures[1]["kind"], "chart");
  const std::string page = render_report(report);
  EXPECT_LT(page.find("data-picture=\"0\""), page.find("between</h2>"));
  EXPECT_GT(page.find("data-picture=\"1\""), page.find("between</h2>"));
}

TEST(ReportData, has_null_where_a_number_is_absent_or_not_finite) {
  Report report;
  ReportChart chart = small_chart("long");
  chart.series[0].points = {{1, std::numeric_limits<double>::quiet_NaN(), {}, std::numeric_limits<double>::infinity()}};
  report.blocks = {chart};
  const auto point = pictures_of(report)[0]["series"][0]["points"][0];
  EXPECT_EQ(point["x"], 1.0);
  for (const char* name : {"y", "low", "high"}) EXPECT_TRUE(point[name].is_null()) << name;
}

TEST(ReportData, carries_all_that_a_trace_shows) {
  Report report;
  report.blocks = {small_trace()};
  const auto trace = pictures_of(report)[0];
  EXPECT_EQ(trace["first_sample"], 40);
  EXPECT_EQ(trace["onset_sample"], 41);
  EXPECT_EQ(trace["firing_sample"], 42);
  EXPECT_EQ(trace["window_samples"], 2);
  EXPECT_EQ(trace["channels"][0]["codes"], (std::vector<int>{201, 263, 202}));
  EXPECT_EQ(trace["channels"][0]["level"], 224.0);
  EXPECT_EQ(trace["channels"][0]["baseline"], 200.0);
  EXPECT_TRUE(trace["channels"][1]["level"].is_null());
}

TEST(ReportText, of_a_script_holds_no_tag_and_no_line_separator) {
  EXPECT_EQ(script_json("\"</script><!-- \xe2\x80\xa8\xe2\x80\xa9\""), "\"\\u003c/script>\\u003c!-- \\u2028\\u2029\"");
}

TEST(ReportText, survives_bytes_that_are_no_text) {
  Report report;
  report.blocks = {small_chart("broken \xff\xfe name")};
  EXPECT_EQ(pictures_of(report)[0]["series"][0]["name"], "broken \xef\xbf\xbd\xef\xbf\xbd name");
}

TEST(ReportText, shows_a_dash_for_what_is_no_number) {
  EXPECT_EQ(number_or_dash(0.123456), "0.1235");
  EXPECT_EQ(number_or_dash(std::nullopt), "-");
  EXPECT_EQ(number_or_dash(std::nan("")), "-");
}

}  // namespace
}  // namespace cistern
