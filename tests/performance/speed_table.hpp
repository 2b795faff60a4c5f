#pragma once
/// \file
/// Speeds measured side by side: every round runs every row once, so that a slow minute of the machine
/// hits all of them; the best round counts.
#include <functional>
#include <string>
#include <vector>

namespace cistern {

/// One line of the table. To add another way to run a trigger, add a row.
struct SpeedRow {
  std::string name;
  std::function<double()>
      million_clocks_per_s;  ///< runs once and says how fast it was; a clock is one sample of every channel
  std::string column{};      ///< not empty: every row's ratio to this one gets a column of this name
};

/// Seconds that `work` takes.
[[nodiscard]] double seconds_of(const std::function<void()>& work);

/// Runs the rows in turns, at most `rounds` times, a slow one until it has used up its share of the time. Prints the
/// best speed of each and its ratios to the rows that have a column.
void print_speeds(const std::vector<SpeedRow>& rows, int rounds);

}  // namespace cistern
