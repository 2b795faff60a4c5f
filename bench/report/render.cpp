#include <fmt/format.h>

#include "bench/report/embedded.hpp"
#include "bench/report/html_text.hpp"
#include "bench/report/picture_data.hpp"
#include "bench/report/report.hpp"

namespace cistern {
namespace {

std::string_view class_of(VerdictState state) {
  switch (state) {
    case VerdictState::Met: return "met";
    case VerdictState::NotMet: return "not-met";
    case VerdictState::Undecided: return "undecided";
    case VerdictState::NoRequirements: return "none";
  }
  return "none";
}

/// A shape beside the word, so that a verdict can be found on paper at a glance.
std::string cell_html(const std::string& text) {
  const char* mark = text == "met" ? "&#10003;" : text == "not met" ? "&#10007;" : text == "undecided" ? "?" : nullptr;
  return mark == nullptr ? html_text(text) : fmt::format("<span class=\"mark\">{} {}</span>", mark, html_text(text));
}

std::string heading_html(const std::string& heading) {
  return heading.empty() ? "" : fmt::format("<h2 id=\"{}\">{}</h2>\n", anchor_of(heading), html_text(heading));
}

std::string note_html(const std::string& note) { return note.empty() ? "" : fmt::format("<p class=\"note\">{}</p>\n", html_text(note)); }

std::string table_html(const std::vector<ReportColumn>& columns, const std::vector<std::vector<std::string>>& rows, const std::string& caption) {
  std::string html = fmt::format("<div class=\"scroll\"><table aria-label=\"{}\"><thead><tr>", html_text(caption));
  for (const ReportColumn& column : columns) {
    const std::string unit = column.unit.empty() ? "" : fmt::format("<span class=\"unit\">{}</span>", html_text(column.unit));
    html += fmt::format("<th scope=\"col\"{} title=\"{}\">{}{}</th>", column.is_number ? " class=\"number\"" : "", html_text(column.meaning), html_text(column.label), unit);
  }
  html += "</tr></thead><tbody>\n";
  for (const auto& row : rows) {
    html += "<tr>";
    for (std::size_t i = 0; i < row.size(); ++i) html += fmt::format("<td{}>{}</td>", i < columns.size() && columns[i].is_number ? " class=\"number\"" : "", cell_html(row[i]));
    html += "</tr>\n";
  }
  return html + "</tbody></table></div>\n";
}

std::string meanings_html(const std::vector<ReportColumn>& columns) {
  std::string items;
  for (const ReportColumn& column : columns) {
    if (!column.meaning.empty()) items += fmt::format("<dt>{}</dt><dd>{}</dd>\n", html_text(column.label), html_text(column.meaning));
  }
  return items.empty() ? "" : "<dl class=\"meanings\">" + items + "</dl>\n";
}

std::string number_or_dash(const std::optional<double>& value) { return value ? fmt::format("{:.4g}", *value) : "-"; }

/// What a chart shows, as a table, for those without scripts.
std::string chart_table(const ReportChart& chart) {
  const std::vector<ReportColumn> columns{{"series", "", "", false}, {chart.x.label, "", "", true}, {chart.y.label, "", "", true}, {"low", "", "", true}, {"high", "", "", true}};
  std::vector<std::vector<std::string>> rows;
  for (const ReportSeries& series : chart.series) {
    for (const ReportPoint& point : series.points) {
      rows.push_back({series.name, fmt::format("{:.4g}", point.x), fmt::format("{:.4g}", point.y), number_or_dash(point.low), number_or_dash(point.high)});
    }
  }
  return "<details><summary>the numbers of this chart</summary>" + table_html(columns, rows, chart.heading) + "</details>\n";
}

/// Renders blocks one after the other; charts and traces get their number among the pictures.
class BlockRenderer {
 public:
  std::string operator()(const ReportText& text) const {
    std::string html = heading_html(text.heading);
    for (const std::string& paragraph : text.paragraphs) html += fmt::format("<p>{}</p>\n", html_text(paragraph));
    return html;
  }
  std::string operator()(const ReportCaution& caution) const { return fmt::format("<p class=\"caution\"><strong>Caution.</strong> {}</p>\n", html_text(caution.text)); }
  std::string operator()(const ReportTable& table) const {
    return heading_html(table.heading) + note_html(table.note) + table_html(table.columns, table.rows, table.heading) + meanings_html(table.columns);
  }
  std::string operator()(const ReportChart& chart) { return heading_html(chart.heading) + note_html(chart.note) + picture_html(chart.heading) + chart_table(chart); }
  std::string operator()(const ReportTrace& trace) { return heading_html(trace.heading) + note_html(trace.note) + picture_html(trace.heading); }

 private:
  std::string picture_html(const std::string& label) {
    return fmt::format("<figure><div data-picture=\"{}\" role=\"img\" aria-label=\"{}\"></div><noscript><p>The picture needs scripting; its numbers are in the tables.</p></noscript></figure>\n",
                       pictures_++, html_text(label));
  }
  int pictures_{0};
};

std::string heading_of(const ReportBlock& block) {
  return std::visit(
      [](const auto& one) -> std::string {
        if constexpr (requires { one.heading; }) return one.heading;
        return "";
      },
      block);
}

std::string navigation_html(const Report& report) {
  std::string links;
  for (const ReportBlock& block : report.blocks) {
    const std::string heading = heading_of(block);
    if (!heading.empty()) links += fmt::format("<a href=\"#{}\">{}</a>\n", anchor_of(heading), html_text(heading));
  }
  return "<nav aria-label=\"parts of this report\">\n" + links + "</nav>\n";
}

std::string verdict_html(const ReportVerdict& verdict) {
  std::string points;
  for (const std::string& point : verdict.points) points += fmt::format("<li>{}</li>\n", html_text(point));
  return fmt::format("<section class=\"verdict {}\" aria-label=\"verdict\"><p class=\"sentence\">{}</p>{}</section>\n", class_of(verdict.state),
                     html_text(verdict.sentence), points.empty() ? "" : "<ul>\n" + points + "</ul>");
}

}  // namespace

std::string render_report(const Report& report) {
  std::string html = fmt::format(
      "<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n<meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n"
      "<title>{}</title>\n<style>\n{}</style>\n</head>\n<body>\n<h1>{}</h1>\n<p class=\"subtitle\">{}</p>\n",
      html_text(report.title), report_style(), html_text(report.title), html_text(report.subtitle));
  html += verdict_html(report.verdict) + navigation_html(report);
  BlockRenderer renderer;
  for (const ReportBlock& block : report.blocks) html += std::visit([&](const auto& one) { return renderer(one); }, block);
  html += "<script type=\"application/json\" id=\"report-data\">" + script_json(picture_data(report)) + "</script>\n<script>";
  html += report_script();
  return html + "</script>\n</body>\n</html>\n";
}

}  // namespace cistern
