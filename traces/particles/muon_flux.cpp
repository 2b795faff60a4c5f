#include "traces/particles/muon_flux.hpp"

#include <cmath>

#include "traces/base/errors.hpp"

namespace cistern {

double muon_energy_gev(double momentum_gev) { return std::hypot(momentum_gev, muon_mass_gev); }

double production_cos_zenith(double cos_zenith) {
  // Guan et al. 2015, equation 2 and table 1.
  constexpr double p1 = 0.102573;
  constexpr double p2 = -0.068287;
  constexpr double p3 = 0.958633;
  constexpr double p4 = 0.0407253;
  constexpr double p5 = 0.817285;
  const double above =
      cos_zenith * cos_zenith + p1 * p1 + p2 * std::pow(cos_zenith, p3) + p4 * std::pow(cos_zenith, p5);
  return std::sqrt(above / (1 + p1 * p1 + p2 + p4));
}

double sea_level_intensity(double energy_gev, double cos_zenith) {
  // Guan et al. 2015, equation 3. The two terms are the muons of pions and of kaons.
  const double c = production_cos_zenith(cos_zenith);
  const double spectrum = 0.14 * std::pow(energy_gev * (1 + 3.64 / (energy_gev * std::pow(c, 1.29))), -2.7);
  const double parents = 1 / (1 + 1.1 * energy_gev * c / 115) + 0.054 / (1 + 1.1 * energy_gev * c / 850);
  constexpr double per_m2_from_per_cm2 = 1e4;
  return per_m2_from_per_cm2 * spectrum * parents;
}

double atmospheric_depth(double altitude_m) {
  CISTERN_ASSERT(altitude_m >= 0 && altitude_m <= 11'000);
  // US Standard Atmosphere 1976: the lowest layer, 6.5 K/km in geopotential height.
  constexpr double earth_radius_m = 6'356'766;
  constexpr double g0 = 9.80665;
  constexpr double lapse_k_per_m = 0.0065;
  constexpr double exponent = g0 * 28.9644e-3 / (8.31432 * lapse_k_per_m);
  const double height_m = earth_radius_m * altitude_m / (earth_radius_m + altitude_m);
  const double pressure_pa = 101'325 * std::pow(1 - lapse_k_per_m * height_m / 288.15, exponent);
  constexpr double g_per_cm2_from_kg_per_m2 = 0.1;
  return pressure_pa / g0 * g_per_cm2_from_kg_per_m2;
}

double altitude_factor(double momentum_gev, double altitude_m) {
  CISTERN_ASSERT(altitude_m >= 0 && altitude_m <= 2500);
  // Attenuation length 263 + 150 p: fitted to Boezio et al. 2000, used after Heisinger et al. 2002.
  const double attenuation_g_per_cm2 = 263 + 150 * momentum_gev;
  return std::exp((atmospheric_depth(0) - atmospheric_depth(altitude_m)) / attenuation_g_per_cm2);
}

double muon_intensity(const MuonConfig& config, double momentum_gev, double cos_zenith) {
  const double energy_gev = muon_energy_gev(momentum_gev);
  const double energy_per_momentum = momentum_gev / energy_gev;  // dE/dp
  return config.flux_scale * altitude_factor(momentum_gev, config.altitude_m) *
         sea_level_intensity(energy_gev, cos_zenith) * energy_per_momentum;
}

}  // namespace cistern
