#include <fmt/format.h>

#include <algorithm>

#include "bench/report/embedded.hpp"
#include "bench/report/html_text.hpp"
#include "bench/report/picture_data.hpp"
#include "bench/report/picture_html.hpp"
#include "bench/report/report.hpp"
#include "bench/report/table_html.hpp"

namespace cistern {
namespace {

/// The policy forbids every load, so that not even a hostile name in the data could fetch anything. The empty
/// icon keeps browsers from asking for one.
constexpr std::string_view head_start =
    "<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n"
    "<meta http-equiv=\"Content-Security-Policy\" content=\"default-src 'none'; style-src 'unsafe-inline'; "
    "script-src 'unsafe-inline'; img-src data:; base-uri 'none'; form-action 'none'\">\n"
    "<meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n<link rel=\"icon\" href=\"data:,\">\n";

struct VerdictLook {
  std::string_view css_class;
  std::string_view symbol;
};

VerdictLook look_of(VerdictState state) {
  switch (state) {
    case VerdictState::Met: return {"met", "&#10003;"};
    case VerdictState::NotMet: return {"not-met", "&#10007;"};
    case VerdictState::Undecided: return {"undecided", "?"};
    case VerdictState::NoRequirements: break;
  }
  return {"none", "&#8211;"};
}

std::string heading_of(const ReportBlock& block) {
  return std::visit(
      [](const auto& one) -> std::string {
        if constexpr (requires { one.heading; }) return one.heading;
        return "";
      },
      block);
}

/// One id per block, empty where it has no heading; equal headings get a number.
std::vector<std::string> anchors_of(const std::vector<ReportBlock>& blocks) {
  std::vector<std::string> anchors;
  for (const ReportBlock& block : blocks) {
    const std::string heading = heading_of(block);
    const std::string first = heading.empty() ? "" : anchor_of(heading);
    std::string anchor = first;
    for (int n = 2; !anchor.empty() && std::count(anchors.begin(), anchors.end(), anchor) > 0; ++n) {
      anchor = fmt::format("{}-{}", first, n);
    }
    anchors.push_back(anchor);
  }
  return anchors;
}

std::string note_html(const std::string& note) {
  return note.empty() ? "" : fmt::format("<p class=\"note\">{}</p>\n", html_text(note));
}

/// The inside of one block after the other; counts the pictures.
class BlockRenderer {
 public:
  std::string operator()(const ReportText& text) const {
    std::string html;
    for (const std::string& paragraph : text.paragraphs) html += fmt::format("<p>{}</p>\n", html_text(paragraph));
    return html;
  }
  std::string operator()(const ReportCaution& caution) const {
    return fmt::format("<p class=\"caution\"><strong>Caution.</strong> {}</p>\n", html_text(caution.text));
  }
  std::string operator()(const ReportTable& table) const { return note_html(table.note) + block_table_html(table); }
  std::string operator()(const ReportChart& chart) { return note_html(chart.note) + chart_html(chart, pictures_++); }
  std::string operator()(const ReportTrace& trace) { return note_html(trace.note) + trace_html(trace, pictures_++); }

 private:
  int pictures_{0};
};

std::string section_html(const std::string& anchor, const std::string& heading, const std::string& inside) {
  if (anchor.empty()) return inside;
  return fmt::format("<section aria-labelledby=\"{0}\">\n<h2 id=\"{0}\">{1}</h2>\n{2}</section>\n", anchor,
                     html_text(heading), inside);
}

std::string navigation_html(const std::vector<ReportBlock>& blocks, const std::vector<std::string>& anchors) {
  std::string links;
  for (std::size_t i = 0; i < blocks.size(); ++i) {
    if (anchors[i].empty()) continue;
    links += fmt::format("<a href=\"#{}\">{}</a>\n", anchors[i], html_text(heading_of(blocks[i])));
  }
  return links.empty() ? "" : "<nav aria-label=\"parts of this report\">\n" + links + "</nav>\n";
}

std::string verdict_html(const ReportVerdict& verdict) {
  std::string points;
  for (const std::string& point : verdict.points) points += fmt::format("<li>{}</li>\n", html_text(point));
  const VerdictLook look = look_of(verdict.state);
  return fmt::format(
      "<section class=\"verdict {}\" aria-label=\"verdict\">\n<span class=\"symbol\" aria-hidden=\"true\">{}</span>\n"
      "<div><p class=\"sentence\">{}</p>\n{}</div>\n</section>\n",
      look.css_class, look.symbol, html_text(verdict.sentence), points.empty() ? "" : "<ul>\n" + points + "</ul>\n");
}

std::string body_html(const Report& report) {
  const auto anchors = anchors_of(report.blocks);
  std::string html = fmt::format("<header>\n<h1>{}</h1>\n<p class=\"subtitle\">{}</p>\n</header>\n<main>\n",
                                 html_text(report.title), html_text(report.subtitle));
  html += verdict_html(report.verdict) + navigation_html(report.blocks, anchors);
  BlockRenderer renderer;
  for (std::size_t i = 0; i < report.blocks.size(); ++i) {
    const std::string inside = std::visit([&](const auto& one) { return renderer(one); }, report.blocks[i]);
    html += section_html(anchors[i], heading_of(report.blocks[i]), inside);
  }
  return html + "</main>\n";
}

}  // namespace

std::string render_report(const Report& report) {
  std::string html(head_start);
  html +=
      fmt::format("<title>{}</title>\n<style>\n{}</style>\n</head>\n<body>\n", html_text(report.title), report_style());
  html += body_html(report);
  html += "<script type=\"application/json\" id=\"report-data\">" + script_json(picture_data(report)) +
          "</script>\n<script>";
  html += report_script();
  return html + "</script>\n</body>\n</html>\n";
}

}  // namespace cistern
