#pragma once
/// \file
/// Charts and traces as HTML: the place where the script draws, what is drawn in words, and the numbers
/// as a table. Internal to the report.
#include <string>

#include "bench/report/report.hpp"

namespace cistern {

/// `number` counts the pictures of the report from 0, as picture_data does.
[[nodiscard]] std::string chart_html(const ReportChart& chart, int number);
[[nodiscard]] std::string trace_html(const ReportTrace& trace, int number);

}  // namespace cistern
