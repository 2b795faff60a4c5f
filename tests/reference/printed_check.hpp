#pragma once
/// \file
/// Checks that print one line each of a table: source, check, expected, got, tolerance.
#include <fmt/core.h>
#include <gtest/gtest.h>

#include <cmath>
#include <string>

namespace cistern {

/// `check` tells the row of the project's list of reference values and the quantity.
inline void check_near(const std::string& source, const std::string& check, double expected, double got,
                       double tolerance) {
  fmt::print("{:<34} {:<58} expected {:<13.8g} got {:<13.8g} tolerance {:.2g}\n", source, check, expected, got,
             tolerance);
  EXPECT_NEAR(got, expected, tolerance) << source << ", " << check;
}

inline void check_relative(const std::string& source, const std::string& check, double expected, double got,
                           double relative) {
  check_near(source, check, expected, got, std::abs(expected) * relative);
}

}  // namespace cistern
