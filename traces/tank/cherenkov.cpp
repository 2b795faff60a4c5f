#include "traces/tank/cherenkov.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>

namespace cistern {

double cherenkov_threshold_gamma(double refractive_index) {
  return refractive_index / std::sqrt(refractive_index * refractive_index - 1);
}

double cherenkov_sin2(double beta, double refractive_index) {
  if (beta * refractive_index <= 1) return 0;
  const double cosine = 1 / (beta * refractive_index);
  return 1 - cosine * cosine;
}

double cherenkov_relative_yield(double beta, double refractive_index) {
  return cherenkov_sin2(beta, refractive_index) / cherenkov_sin2(1, refractive_index);
}

double cherenkov_photons_per_m(double beta, double refractive_index, double from_nm, double to_nm) {
  constexpr double fine_structure = 1 / 137.035999084;
  constexpr double per_m_from_per_nm = 1e9;
  return 2 * std::numbers::pi * fine_structure * cherenkov_sin2(beta, refractive_index) * (1 / from_nm - 1 / to_nm) *
         per_m_from_per_nm;
}

}  // namespace cistern
