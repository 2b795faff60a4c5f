#include "bench/report/table_html.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "bench/report/html_text.hpp"

namespace cistern {
namespace {

using Rows = std::vector<std::vector<std::string>>;

/// About two pages on paper; more is for looking things up.
constexpr std::size_t rows_unfolded_max = 60;

struct VerdictMark {
  std::string_view word;
  std::string_view css_class;
  std::string_view symbol;
};

/// A shape beside the word, so that a verdict is found on paper at a glance.
constexpr VerdictMark verdict_marks[] = {
    {"met", "met", "&#10003;"}, {"not met", "not-met", "&#10007;"}, {"undecided", "undecided", "?"}};

const VerdictMark* mark_of(std::string_view text) {
  const auto* mark = std::find_if(std::begin(verdict_marks), std::end(verdict_marks),
                                  [&](const VerdictMark& one) { return one.word == text; });
  return mark == std::end(verdict_marks) ? nullptr : mark;
}

std::string cell_html(std::string_view text) {
  const VerdictMark* mark = mark_of(text);
  if (mark == nullptr) return html_text(text);
  return fmt::format("<span class=\"mark {}\"><span aria-hidden=\"true\">{}</span> {}</span>", mark->css_class,
                     mark->symbol, mark->word);
}

std::string_view text_at(const std::vector<std::string>& row, std::size_t column) {
  return column < row.size() ? std::string_view(row[column]) : std::string_view();
}

std::vector<std::size_t> columns_with_text(std::size_t columns, const Rows& rows) {
  std::vector<std::size_t> used;
  for (std::size_t c = 0; c < columns; ++c) {
    const bool has_text =
        std::any_of(rows.begin(), rows.end(), [&](const auto& row) { return !text_at(row, c).empty(); });
    if (has_text || rows.empty()) used.push_back(c);
  }
  return used;
}

std::string_view class_of(const ReportColumn& column) { return column.is_number ? " class=\"number\"" : ""; }

std::string header_html(const ReportColumn& column) {
  const std::string unit =
      column.unit.empty() ? "" : fmt::format("<span class=\"unit\">{}</span>", html_text(column.unit));
  const std::string title = column.meaning.empty() ? "" : fmt::format(" title=\"{}\"", html_text(column.meaning));
  return fmt::format("<th scope=\"col\"{}{}>{}{}</th>", class_of(column), title, html_text(column.label), unit);
}

std::string meanings_html(const ReportTable& table) {
  std::string items;
  for (const std::size_t c : columns_with_text(table.columns.size(), table.rows)) {
    const ReportColumn& column = table.columns[c];
    if (column.meaning.empty()) continue;
    items += fmt::format("<dt>{}</dt><dd>{}</dd>\n", html_text(column.label), html_text(column.meaning));
  }
  return items.empty() ? "" : "<dl class=\"meanings\">\n" + items + "</dl>\n";
}

}  // namespace

std::string table_html(const std::vector<ReportColumn>& columns, const Rows& rows, std::string_view caption) {
  const auto used = columns_with_text(columns.size(), rows);
  std::string html = fmt::format("<div class=\"scroll\"><table><caption>{}</caption>\n<thead><tr>", html_text(caption));
  for (const std::size_t c : used) html += header_html(columns[c]);
  html += "</tr></thead>\n<tbody>\n";
  for (const auto& row : rows) {
    html += "<tr>";
    for (const std::size_t c : used) {
      html += fmt::format("<td{}>{}</td>", class_of(columns[c]), cell_html(text_at(row, c)));
    }
    html += "</tr>\n";
  }
  if (rows.empty()) html += fmt::format("<tr><td colspan=\"{}\">no rows</td></tr>\n", used.size());
  return html + "</tbody></table></div>\n";
}

std::string block_table_html(const ReportTable& table) {
  std::string html = table_html(table.columns, table.rows, table.heading);
  if (table.rows.size() > rows_unfolded_max) {
    html = fmt::format("<details class=\"long\"><summary>{} rows, folded</summary>\n{}</details>\n", table.rows.size(),
                       html);
  }
  return html + meanings_html(table);
}

}  // namespace cistern
