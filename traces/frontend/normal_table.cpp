#include "traces/frontend/normal_table.hpp"

#include <boost/math/distributions/normal.hpp>

namespace cistern {
namespace {

double size_at(double tail) {
  const boost::math::normal standard;
  return boost::math::quantile(boost::math::complement(standard, tail * 0x1p-32));
}

NormalTable make_table() {
  NormalTable table{};
  for (std::size_t i = 0; i < NormalTable::pieces; ++i) {
    const auto start = std::bit_cast<float>((static_cast<std::uint32_t>(i) + NormalTable::first_index) << NormalTable::mantissa_shift);
    const auto end = std::bit_cast<float>((static_cast<std::uint32_t>(i) + 1 + NormalTable::first_index) << NormalTable::mantissa_shift);
    if (start >= 0x1p31F) break;  // beyond one half: reached by rounding only, and the size is 0
    const double slope = (size_at(end) - size_at(start)) / (static_cast<double>(end) - start);
    const double middle = 0.5 * (static_cast<double>(start) + end);
    const double above = size_at(start) + slope * (middle - start) - size_at(middle);
    // A chord lies above the curve, by two thirds of its error in the middle on average.
    table.base[i] = static_cast<float>(size_at(start) - slope * start - above * 2 / 3);
    table.slope[i] = static_cast<float>(slope);
  }
  return table;
}

}  // namespace

const NormalTable& normal_table() {
  static const NormalTable table = make_table();
  return table;
}

}  // namespace cistern
