#include "tests/performance/speed_table.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <chrono>

namespace cistern {
namespace {

constexpr int rounds_at_least = 3;
constexpr double seconds_a_row = 3;

void print_table(const std::vector<SpeedRow>& rows, const std::vector<double>& best) {
  fmt::print("{:<56}{:>18}", "", "million clocks/s");
  for (const SpeedRow& row : rows) {
    if (!row.column.empty()) fmt::print("{:>14}", row.column);
  }
  fmt::print("\n");
  for (std::size_t i = 0; i < rows.size(); ++i) {
    fmt::print("{:<56}{:>18.1f}", rows[i].name, best[i]);
    for (std::size_t reference = 0; reference < rows.size(); ++reference) {
      if (!rows[reference].column.empty()) fmt::print("{:>14.3g}", best[i] / best[reference]);
    }
    fmt::print("\n");
  }
}

}  // namespace

double seconds_of(const std::function<void()>& work) {
  const auto begin = std::chrono::steady_clock::now();
  work();
  return std::chrono::duration<double>(std::chrono::steady_clock::now() - begin).count();
}

void print_speeds(const std::vector<SpeedRow>& rows, int rounds) {
  std::vector<double> best(rows.size(), 0);
  std::vector<double> spent_s(rows.size(), 0);
  for (int round = 0; round < rounds; ++round) {
    for (std::size_t i = 0; i < rows.size(); ++i) {
      if (round >= rounds_at_least && spent_s[i] > seconds_a_row) continue;
      spent_s[i] += seconds_of([&] { best[i] = std::max(best[i], rows[i].million_clocks_per_s()); });
    }
  }
  print_table(rows, best);
}

}  // namespace cistern
