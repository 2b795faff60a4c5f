#include "bench/results/figure.hpp"

#include <fmt/format.h>

namespace cistern {

std::string figure_number(double value) {
  std::string text = fmt::format("{}", value < 0 ? -value : value);
  for (char& c : text) {
    if (c == '.') c = 'p';
  }
  return value < 0 ? "minus_" + text : text;
}

}  // namespace cistern
