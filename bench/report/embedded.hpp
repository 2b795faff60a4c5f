#pragma once
/// \file
/// The script and the style sheet of reports, built from bench/report/web and kept in the program.
#include <string_view>

namespace cistern {

[[nodiscard]] std::string_view report_script();
[[nodiscard]] std::string_view report_style();

}  // namespace cistern
