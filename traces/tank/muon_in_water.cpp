/// \file
/// Method: range and light of a muon that stops are integrals over its kinetic energy; on a
/// piece of its way it makes the difference between the light it could make before and after.
#include "traces/tank/muon_in_water.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>

#include "traces/base/errors.hpp"
#include "traces/tank/cherenkov.hpp"

namespace cistern {
namespace {

constexpr double muon_mass_mev = 105.6583755;     // Particle Data Group
constexpr double electron_mass_mev = 0.51099895;  // Particle Data Group
constexpr double kinetic_min_mev = 1;             // 0.005 cm from rest
constexpr double kinetic_max_mev = 1e7;
constexpr std::size_t nodes = 801;

double beta_of(double kinetic_mev) {
  const double gamma = 1 + kinetic_mev / muon_mass_mev;
  return std::sqrt(1 - 1 / (gamma * gamma));
}

/// Sternheimer's parametrisation; water: Groom, Mokhov, Striganov 2001.
double density_effect(double beta_gamma) {
  constexpr double a = 0.09116;
  constexpr double k = 3.4773;
  constexpr double x0 = 0.2400;
  constexpr double x1 = 2.8004;
  constexpr double c = 3.5017;
  const double x = std::log10(beta_gamma);
  if (x < x0) return 0;
  const double far = 2 * std::numbers::ln10 * x - c;
  return x >= x1 ? far : far + a * std::pow(x1 - x, k);
}

/// Photons radiated by the electrons that are hit, in units of K Z/A: Groom, Mokhov, Striganov 2001,
/// from memory. Half a per cent at 4 GeV.
double electron_bremsstrahlung(double gamma, double largest_mev) {
  constexpr double fine_structure = 1 / 137.035999084;
  const double hardest = std::log(2 * largest_mev / electron_mass_mev);
  return fine_structure / (4 * std::numbers::pi) * (std::log(2 * gamma) - hardest / 3) * hardest * hardest;
}

/// The value at `x`, on straight lines between the points (`at`, `values`); `at` rises.
double interpolate(const std::vector<double>& at, const std::vector<double>& values, double x) {
  const auto above = std::upper_bound(at.begin() + 1, at.end() - 1, x);
  const auto i = static_cast<std::size_t>(above - at.begin());
  const double part = (x - at[i - 1]) / (at[i] - at[i - 1]);
  return values[i - 1] + part * (values[i] - values[i - 1]);
}

}  // namespace

double muon_stopping_power(double kinetic_mev) {
  constexpr double k_mev_cm2 = 0.307075;  // 4 pi N_A r_e^2 m_e c^2, Particle Data Group
  constexpr double charge_over_mass = 0.55509;
  constexpr double excitation_mev = 75e-6;
  const double gamma = 1 + kinetic_mev / muon_mass_mev;
  const double beta2 = 1 - 1 / (gamma * gamma);
  const double beta_gamma2 = gamma * gamma - 1;
  const double mass_ratio = electron_mass_mev / muon_mass_mev;
  const double largest_mev =
      2 * electron_mass_mev * beta_gamma2 / (1 + 2 * gamma * mass_ratio + mass_ratio * mass_ratio);
  const double logarithm =
      0.5 * std::log(2 * electron_mass_mev * beta_gamma2 * largest_mev / (excitation_mev * excitation_mev));
  const double spin = largest_mev / (gamma * muon_mass_mev);
  const double bethe = (logarithm - beta2 - 0.5 * density_effect(std::sqrt(beta_gamma2)) + spin * spin / 8) / beta2;
  return k_mev_cm2 * charge_over_mass * (bethe + electron_bremsstrahlung(gamma, largest_mev));
}

MuonInWater::MuonInWater() {
  const double step = std::log(kinetic_max_mev / kinetic_min_mev) / (nodes - 1);
  double range = 0;
  double light = 0;
  for (std::size_t i = 0; i < nodes; ++i) {
    const double log_kinetic = std::log(kinetic_min_mev) + static_cast<double>(i) * step;
    if (i > 0) {
      const double middle = std::exp(log_kinetic - step / 2);
      const double way = middle * step / muon_stopping_power(middle);
      range += way;
      light += way * cherenkov_relative_yield(beta_of(middle), water_refractive_index);
    }
    log_kinetic_mev_.push_back(log_kinetic);
    range_cm_.push_back(range);
    light_cm_.push_back(light);
  }
}

double MuonInWater::range_cm(double kinetic_mev) const {
  CISTERN_ASSERT(kinetic_mev >= kinetic_min_mev && kinetic_mev <= kinetic_max_mev);
  return interpolate(log_kinetic_mev_, range_cm_, std::log(kinetic_mev));
}

double MuonInWater::light_of_range(double range_cm) const { return interpolate(range_cm_, light_cm_, range_cm); }

double MuonInWater::light_path_m(double momentum_gev, double length_m) const {
  constexpr double cm_per_m = 100;
  const double momentum_mev = 1000 * momentum_gev;
  const double kinetic_mev = std::hypot(momentum_mev, muon_mass_mev) - muon_mass_mev;
  const double range = range_cm(kinetic_mev);
  const double left = std::max(0.0, range - cm_per_m * length_m);
  return (light_of_range(range) - light_of_range(left)) / cm_per_m;
}

}  // namespace cistern
