/// \file
/// The atmospheric muons against published tables and independent integrals.
#include <boost/math/quadrature/gauss_kronrod.hpp>
#include <cmath>
#include <functional>
#include <numbers>

#include "tests/reference/printed_check.hpp"
#include "traces/base/random.hpp"
#include "traces/particles/muon_flux.hpp"
#include "traces/particles/muon_sampler.hpp"

namespace cistern {
namespace {

using std::numbers::pi;
using Function = std::function<double(double)>;

double integrate(const Function& f, double from, double to) {
  return boost::math::quadrature::gauss_kronrod<double, 61>::integrate(f, from, to, 12, 1e-8);
}

/// Over energy from the given total energy, with the energy's logarithm as variable.
double integral_over_energy(const Function& f, double energy_min_gev, double energy_max_gev = 1e5) {
  return integrate([&](double x) { return std::exp(x) * f(std::exp(x)); }, std::log(energy_min_gev),
                   std::log(energy_max_gev));
}

double momentum_of(double energy_gev) { return std::sqrt(energy_gev * energy_gev - muon_mass_gev * muon_mass_gev); }

double vertical(double energy_min_gev) {
  return integral_over_energy([](double energy) { return sea_level_intensity(energy, 1); }, energy_min_gev);
}

/// Over all directions of the sky, with a weight of the cosine of zenith.
double over_sky(double momentum_min_gev, const Function& weight, double altitude_m = 0, double energy_max_gev = 1e5) {
  return integrate(
      [&](double c) {
        return 2 * pi * weight(c) *
               integral_over_energy(
                   [&](double energy) {
                     return altitude_factor(momentum_of(energy), altitude_m) * sea_level_intensity(energy, c);
                   },
                   muon_energy_gev(momentum_min_gev), energy_max_gev);
      },
      0, 1);
}

TEST(MuonReference, intensity_has_the_values_of_the_published_formula) {
  struct Row {
    double energy_gev;
    double at_0, at_30, at_60, at_75;
  };
  const Row rows[] = {
      {0.3, 36.3028, 22.7906, 3.75145, 0.459369}, {0.5, 31.7021, 20.3246, 3.53517, 0.446906},
      {1, 23.1963, 15.5590, 3.06371, 0.417692},   {3, 8.65720, 6.52683, 1.84192, 0.323614},
      {10, 1.16711, 1.02296, 0.509278, 0.153510}, {100, 2.82850e-3, 2.95605e-3, 3.21912e-3, 2.90927e-3}};
  const auto check = [](double energy, double degrees, double expected) {
    check_relative("Guan et al. 2015, eqs 2-3",
                   fmt::format("P33 intensity at {} GeV, {} deg, /m2 s sr GeV", energy, degrees), expected,
                   sea_level_intensity(energy, std::cos(degrees * pi / 180)), 1e-5);
  };
  for (const Row& row : rows) {
    check(row.energy_gev, 0, row.at_0);
    check(row.energy_gev, 30, row.at_30);
    check(row.energy_gev, 60, row.at_60);
    check(row.energy_gev, 75, row.at_75);
  }
}

TEST(MuonReference, production_angle_has_the_values_of_the_published_formula) {
  const std::pair<double, double> rows[] = {
      {30, 0.866036}, {60, 0.502797}, {75, 0.271229}, {85, 0.131807}, {90, 0.103458}};
  for (const auto& [degrees, expected] : rows) {
    check_relative("Guan et al. 2015, eq. 2, table 1", fmt::format("P33 cos(theta*) at {} deg", degrees), expected,
                   production_cos_zenith(std::max(0.0, std::cos(degrees * pi / 180))), 1e-5);
  }
}

TEST(MuonReference, vertical_integral_depends_on_what_is_cut) {
  const char* source = "Guan et al. 2015, integrated";
  const double limits[] = {0.2, 0.5, 1};
  const double of_energy[] = {84.619, 74.072, 60.498};
  const double of_momentum[] = {83.608, 73.723, 60.369};
  const double of_kinetic[] = {80.653, 70.836, 58.121};
  for (int i = 0; i < 3; ++i) {
    check_relative(source, fmt::format("P34 vertical, E > {} GeV, /m2 s sr", limits[i]), of_energy[i],
                   vertical(limits[i]), 1e-4);
    check_relative(source, fmt::format("P34 vertical, p > {} GeV/c, /m2 s sr", limits[i]), of_momentum[i],
                   vertical(muon_energy_gev(limits[i])), 1e-4);
    check_relative(source, fmt::format("P34 vertical, T > {} GeV, /m2 s sr", limits[i]), of_kinetic[i],
                   vertical(limits[i] + muon_mass_gev), 1e-4);
  }
}

TEST(MuonReference, rates_through_a_plane_and_a_sphere) {
  const char* source = "Guan et al. 2015, integrated";
  const double limits[] = {0.2, 0.5, 1};
  const double plane[] = {128.55, 116.63, 99.78};
  const double sphere[] = {170.76, 156.01, 134.99};
  for (int i = 0; i < 3; ++i) {
    check_relative(source, fmt::format("P35 horizontal plane, p > {} GeV/c, /m2 s", limits[i]), plane[i],
                   over_sky(limits[i], [](double c) { return c; }), 1e-3);
    check_relative(source, fmt::format("P35 omnidirectional, p > {} GeV/c, /m2 s", limits[i]), sphere[i],
                   over_sky(limits[i], [](double) { return 1.0; }), 1e-3);
  }
}

TEST(MuonReference, agrees_with_measured_rates_as_well_as_these_agree_with_each_other) {
  const double plane = over_sky(0.2, [](double c) { return c; });
  check_relative("Grieder 2001", "P45 horizontal plane, p > 0.2 GeV/c, /m2 s", 150, plane, 0.30);
  check_relative("PDG Review, Cosmic Rays", "P1 vertical, p > 1 GeV/c, /m2 s sr", 70, vertical(muon_energy_gev(1)),
                 0.15);
}

TEST(MuonReference, depth_is_that_of_the_standard_atmosphere) {
  const std::pair<double, double> rows[] = {{0, 1033.23},   {500, 973.43},  {1000, 916.48},
                                            {2000, 810.69}, {5000, 551.14}, {10000, 270.22}};
  for (const auto& [altitude, expected] : rows) {
    check_relative("US Standard Atmosphere 1976", fmt::format("depth p/g0 at {} m, g/cm2", altitude), expected,
                   atmospheric_depth(altitude), 2e-5);
  }
}

TEST(MuonReference, altitude_factor_has_the_values_of_the_attenuation_lengths) {
  struct Row {
    const char* id;
    double altitude_m, momentum_gev, expected;
  };
  const Row rows[] = {{"P40", 1000, 0.2, 1.48951}, {"P40", 1000, 0.3, 1.46088}, {"P40", 1000, 0.5, 1.41255},
                      {"P40", 1000, 1, 1.32667},   {"P40", 1000, 3, 1.17790},   {"P40", 1000, 10, 1.06846},
                      {"P41", 500, 0.3, 1.21426},  {"P41", 1500, 0.3, 1.74205}, {"P41", 2000, 0.3, 2.05963},
                      {"P41", 500, 1, 1.15578},    {"P41", 1500, 1, 1.51277},   {"P41", 2000, 1, 1.71401}};
  for (const Row& row : rows) {
    check_relative("Heisinger et al. 2002, Boezio 2000",
                   fmt::format("{} factor at {} m, {} GeV/c", row.id, row.altitude_m, row.momentum_gev), row.expected,
                   altitude_factor(row.momentum_gev, row.altitude_m), 1e-4);
  }
}

TEST(MuonReference, vertical_rate_rises_with_altitude) {
  const double altitudes[] = {500, 1000, 1500, 2000};
  const double above_0p2[] = {1.1132, 1.2361, 1.3690, 1.5119};
  const double above_1[] = {1.0839, 1.1719, 1.2638, 1.3593};
  const auto ratio = [](double momentum_min, double altitude) {
    const auto at = [&](double height) {
      return integral_over_energy(
          [&](double e) { return altitude_factor(momentum_of(e), height) * sea_level_intensity(e, 1); },
          muon_energy_gev(momentum_min));
    };
    return at(altitude) / at(0);
  };
  for (int i = 0; i < 4; ++i) {
    check_relative("P40 folded with Guan", fmt::format("P42 ratio at {} m, p > 0.2 GeV/c", altitudes[i]), above_0p2[i],
                   ratio(0.2, altitudes[i]), 1e-3);
    check_relative("P40 folded with Guan", fmt::format("P42 ratio at {} m, p > 1 GeV/c", altitudes[i]), above_1[i],
                   ratio(1, altitudes[i]), 1e-3);
  }
}

double plate(double cos_zenith) { return cos_zenith; }

TEST(MuonReference, sampler_has_the_rate_of_an_independent_integral) {
  const MuonSampler sampler({.altitude_m = 880, .momentum_min_gev = 0.2}, plate);
  check_relative("flux times area, integrated", "muons through 1 m2 at 880 m, p > 0.2 GeV/c, /s",
                 over_sky(0.2, plate, 880, muon_momentum_max_gev), sampler.rate_hz(), 1e-3);
}

TEST(MuonReference, sampler_draws_momenta_and_angles_of_the_flux) {
  constexpr std::uint64_t seed = 11;
  constexpr int draws = 200'000;
  const MuonSampler sampler({.altitude_m = 0}, plate);
  RandomStream stream(seed, Purpose::PropertyTest, 0);
  int above_1 = 0;
  int above_10 = 0;
  double cosines = 0;
  for (int i = 0; i < draws; ++i) {
    const Muon muon = sampler.draw(stream);
    above_1 += muon.momentum_gev > 1;
    above_10 += muon.momentum_gev > 10;
    cosines += muon.cos_zenith;
  }
  const double all = over_sky(0.2, plate);
  const auto check_share = [&](const char* what, double expected, int seen) {
    check_near("Guan et al. 2015, integrated", what, expected, static_cast<double>(seen) / draws,
               4 * std::sqrt(expected * (1 - expected) / draws));
  };
  check_share("share of the plane's muons above 1 GeV/c", over_sky(1, plate) / all, above_1);
  check_share("share of the plane's muons above 10 GeV/c", over_sky(10, plate) / all, above_10);
  const auto moment = [&](int power) {
    return over_sky(0.2, [power](double c) { return std::pow(c, power + 1); }) / all;
  };
  const double variance = moment(2) - moment(1) * moment(1);
  check_near("Guan et al. 2015, integrated", "mean cosine of zenith through a plane", moment(1), cosines / draws,
             4 * std::sqrt(variance / draws));
}

}  // namespace
}  // namespace cistern
