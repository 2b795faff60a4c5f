#include "traces/frontend/normal_table.hpp"

#include <boost/math/distributions/normal.hpp>

namespace cistern {
namespace {

constexpr double half = 0x1p31;  // the tail probability 1/2

double start_of(std::size_t cell) {
  return std::bit_cast<float>((static_cast<std::uint32_t>(cell) + NormalTable::first_cell)
                              << NormalTable::mantissa_shift);
}

double density_at(double tail) {
  const boost::math::normal standard;
  return boost::math::pdf(standard, boost::math::quantile(boost::math::complement(standard, tail * 0x1p-32)));
}

NormalTable make_table() {
  NormalTable table{};  // cells beyond one half are reached by rounding only, and their size is 0
  double density = density_at(start_of(0));
  for (std::size_t cell = 0; start_of(cell) < half; ++cell) {
    // The integral of x times the density is minus the density.
    const double density_at_end = density_at(start_of(cell + 1));
    const double probability = (start_of(cell + 1) - start_of(cell)) * 0x1p-32;
    table.size[cell] = static_cast<float>((density_at_end - density) / probability);
    density = density_at_end;
  }
  return table;
}

}  // namespace

const NormalTable& normal_table() {
  static const NormalTable table = make_table();
  return table;
}

}  // namespace cistern
