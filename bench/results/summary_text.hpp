#pragma once
/// \file
/// The summary of a run as JSON and as JUnit XML.
#include <string>

#include "bench/results/figure.hpp"

namespace cistern {

/// summary.json; keys in a fixed order, absent numbers as null.
[[nodiscard]] std::string summary_json(const Summary& summary);

/// junit.xml: one test case per requirement; not met and undecided are failures.
[[nodiscard]] std::string junit_xml(const Summary& summary);

}  // namespace cistern
