#pragma once
/// \file
/// Tables of a report as HTML. Internal to the report.
#include <string>
#include <string_view>
#include <vector>

#include "bench/report/report.hpp"

namespace cistern {

/// One table with its caption, for those who hear it; the columns of `columns` that have any text.
[[nodiscard]] std::string table_html(const std::vector<ReportColumn>& columns,
                                     const std::vector<std::vector<std::string>>& rows, std::string_view caption);

/// A table of a report: folded where it is long, with the meanings of its columns below.
[[nodiscard]] std::string block_table_html(const ReportTable& table);

}  // namespace cistern
