#include "traces/base/spelling.hpp"

#include <algorithm>
#include <vector>

namespace cistern {

std::size_t edit_distance(std::string_view a, std::string_view b) {
  std::vector<std::vector<std::size_t>> cost(a.size() + 1, std::vector<std::size_t>(b.size() + 1));
  for (std::size_t i = 0; i <= a.size(); ++i) cost[i][0] = i;
  for (std::size_t j = 0; j <= b.size(); ++j) cost[0][j] = j;
  for (std::size_t i = 1; i <= a.size(); ++i) {
    for (std::size_t j = 1; j <= b.size(); ++j) {
      cost[i][j] = std::min({cost[i - 1][j] + 1, cost[i][j - 1] + 1, cost[i - 1][j - 1] + (a[i - 1] != b[j - 1])});
      if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1]) {
        cost[i][j] = std::min(cost[i][j], cost[i - 2][j - 2] + 1);
      }
    }
  }
  return cost[a.size()][b.size()];
}

std::string nearest_word(std::string_view word, std::span<const std::string> known) {
  const auto nearest = std::min_element(known.begin(), known.end(), [&](const auto& x, const auto& y) {
    return edit_distance(word, x) < edit_distance(word, y);
  });
  return nearest == known.end() ? std::string{} : *nearest;
}

}  // namespace cistern
