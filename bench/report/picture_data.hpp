#pragma once
/// \file
/// Charts and traces as the JSON that the report's script reads. Internal to the report.
#include <string>

#include "bench/report/report.hpp"

namespace cistern {

/// A JSON array with one object per chart and trace, in the order of the report.
[[nodiscard]] std::string picture_data(const Report& report);

}  // namespace cistern
