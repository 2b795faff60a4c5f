/// \file
/// Geometry, Cherenkov light, slowing down and light decay against published values.
#include <cmath>
#include <numbers>

#include "tests/reference/printed_check.hpp"
#include "traces/base/random.hpp"
#include "traces/tank/cherenkov.hpp"
#include "traces/tank/cylinder.hpp"
#include "traces/tank/light_decay.hpp"
#include "traces/tank/muon_in_water.hpp"

namespace cistern {
namespace {

using std::numbers::pi;
constexpr std::uint64_t seed = 12;

double beta_of(double momentum_mev) { return momentum_mev / std::hypot(momentum_mev, 105.6583755); }

struct Chords {
  double mean;
  double error;
};

/// Zenith angles of a flux that goes as the given power of the cosine, by rejection.
Chords draw_chords(const Cylinder& water, int power, int tracks) {
  RandomStream stream(seed, Purpose::PropertyTest, static_cast<std::uint64_t>(power));
  const double largest_area = water.projected_area_m2(1) + 2 * water.radius_m * water.depth_m;
  double sum = 0;
  double squares = 0;
  for (int n = 0; n < tracks;) {
    const double cosine = stream.uniform();
    if (stream.uniform() * largest_area > water.projected_area_m2(cosine) * std::pow(cosine, power)) continue;
    const Track track = draw_track(water, cosine, stream);
    sum += track.length_m;
    squares += track.length_m * track.length_m;
    ++n;
  }
  const double mean = sum / tracks;
  return {mean, std::sqrt((squares / tracks - mean * mean) / tracks)};
}

TEST(GeometryReference, mean_chords_obey_cauchys_theorem) {
  for (const Cylinder water : {Cylinder{1, 1}, Cylinder{1.5, 1.2}, Cylinder{2, 1}}) {
    const double r = water.radius_m;
    const double h = water.depth_m;
    check_relative("Cauchy 1850", fmt::format("G1 4V/S of R {} H {}, m", r, h), 2 * r * h / (r + h),
                   water.mean_chord_m(), 1e-12);
    const Chords isotropic = draw_chords(water, 0, 200'000);
    check_near("Cauchy 1850; Kellerer 1971", fmt::format("G1 mean chord drawn, isotropic, R {} H {}, m", r, h),
               2 * r * h / (r + h), isotropic.mean, 4 * isotropic.error);
    const Chords cos2 = draw_chords(water, 2, 200'000);
    check_near("elementary", fmt::format("G2 mean chord drawn, cos^2, R {} H {}, m", r, h),
               8 * r * h / (3 * (2 * r + h)), cos2.mean, 4 * cos2.error);
  }
}

TEST(GeometryReference, cos2_flux_crosses_at_the_closed_rate) {
  const std::pair<Cylinder, double> rows[] = {{{1, 1}, 7.402203}, {{1.5, 1.2}, 15.544627}, {{2, 1}, 24.674011}};
  for (const auto& [water, expected] : rows) {
    constexpr int steps = 20'000;
    double rate = 0;
    for (int i = 0; i < steps; ++i) {
      const double cosine = (i + 0.5) / steps;
      rate += 2 * pi / steps * cosine * cosine * water.projected_area_m2(cosine);
    }
    check_relative("elementary",
                   fmt::format("G3 crossing rate over I0, R {} H {}, m2 sr", water.radius_m, water.depth_m), expected,
                   rate, 1e-6);
  }
}

TEST(GeometryReference, chords_of_a_parallel_beam) {
  constexpr Cylinder water{1, 1};
  const double degrees[] = {0, 30, 45, 60};
  const double mean[] = {1, 0.844355, 0.864106, 0.951177};
  for (int i = 0; i < 4; ++i) {
    const double cosine = std::cos(degrees[i] * pi / 180);
    check_relative("elementary", fmt::format("G4 mean chord of a beam at {} deg, volume / area, m", degrees[i]),
                   mean[i], water.volume_m3() / water.projected_area_m2(cosine), 1e-6);
    RandomStream stream(seed, Purpose::PropertyTest, 100 + static_cast<std::uint64_t>(i));
    constexpr int tracks = 100'000;
    double sum = 0;
    double squares = 0;
    for (int n = 0; n < tracks; ++n) {
      const double length = draw_track(water, cosine, stream).length_m;
      sum += length;
      squares += length * length;
    }
    const double error = std::sqrt(std::max(0.0, squares / tracks - sum / tracks * (sum / tracks)) / tracks);
    check_near("elementary", fmt::format("G4 mean chord drawn in a beam at {} deg, m", degrees[i]), mean[i],
               sum / tracks, 4 * error + 1e-6);
  }
}

TEST(GeometryReference, chords_through_the_centre) {
  constexpr Cylinder water{1, 1};
  const std::pair<double, double> rows[] = {{0, 1}, {30, 1.154701}, {45, 1.414214}, {60, 2.0}, {75, 2.070552}};
  for (const auto& [degrees, expected] : rows) {
    const double angle = degrees * pi / 180;
    const Vector3 down{std::sin(angle), 0, -std::cos(angle)};
    const Vector3 up{-down.x, 0, -down.z};
    const Vector3 centre{0, 0, 0.5};
    check_relative("elementary", fmt::format("G5 chord through the centre at {} deg, m", degrees), expected,
                   water.way_to_wall_m(centre, down) + water.way_to_wall_m(centre, up), 1e-6);
  }
}

TEST(CherenkovReference, angle_threshold_and_yield) {
  check_relative("Frank and Tamm 1937", "C2 sin^2 of the largest angle, n 1.33", 0.434677, cherenkov_sin2(1, 1.33),
                 2e-6);
  check_relative("Frank and Tamm 1937; PDG", "C3 photons/cm, 300-600 nm", 332.170,
                 cherenkov_photons_per_m(1, 1.33, 300, 600) / 100, 1e-5);
  check_relative("Frank and Tamm 1937; PDG", "C3 photons/cm, 400-700 nm", 213.538,
                 cherenkov_photons_per_m(1, 1.33, 400, 700) / 100, 1e-5);
  check_relative("Frank and Tamm 1937; PDG", "C3 photons/cm, 350-500 nm", 170.830,
                 cherenkov_photons_per_m(1, 1.33, 350, 500) / 100, 1e-5);
  check_relative("kinematics", "C4 threshold gamma, n 1.33", 1.516759, cherenkov_threshold_gamma(1.33), 1e-6);
  const double gamma = cherenkov_threshold_gamma(1.33);
  check_relative("kinematics", "C5 muon threshold, kinetic, MeV", 54.600, 105.6583755 * (gamma - 1), 1e-5);
  check_relative("kinematics", "C5 muon threshold, momentum, MeV/c", 120.495,
                 105.6583755 * std::sqrt(gamma * gamma - 1), 1e-5);
  check_relative("kinematics", "C6 muon threshold, kinetic, n 1.34, MeV", 53.072,
                 105.6583755 * (cherenkov_threshold_gamma(1.34) - 1), 1e-5);
}

TEST(CherenkovReference, yield_of_slow_muons) {
  struct Row {
    double momentum_gev, degrees, yield;
  };
  const Row rows[] = {{0.2, 31.750, 0.63702}, {0.3, 37.141, 0.83868}, {0.5, 39.782, 0.94192}, {1, 40.881, 0.98548}};
  for (const Row& row : rows) {
    const double beta = beta_of(1000 * row.momentum_gev);
    check_relative("Frank and Tamm 1937", fmt::format("C7 angle at {} GeV/c, deg", row.momentum_gev), row.degrees,
                   std::asin(std::sqrt(cherenkov_sin2(beta, 1.33))) * 180 / pi, 2e-5);
    check_relative("Frank and Tamm 1937", fmt::format("C7 relative yield at {} GeV/c", row.momentum_gev), row.yield,
                   cherenkov_relative_yield(beta, 1.33), 1e-5);
  }
}

TEST(MuonInWaterReference, loses_energy_as_published) {
  const std::pair<double, double> rows[] = {{100, 2.269}, {1000, 2.105}, {4000, 2.346}};
  for (const auto& [kinetic, expected] : rows) {
    check_relative("Bethe, density effect", fmt::format("P26 muon dE/dx at {} MeV, MeV cm2/g", kinetic), expected,
                   muon_stopping_power(kinetic), 5e-3);
  }
  check_relative("Groom, Mokhov, Striganov 2001", "P24 smallest muon dE/dx (at 318 MeV)", 1.992,
                 muon_stopping_power(318), 3e-3);
  EXPECT_LT(muon_stopping_power(318), muon_stopping_power(270));
  EXPECT_LT(muon_stopping_power(318), muon_stopping_power(370));
}

TEST(MuonInWaterReference, stops_within_the_tabulated_range) {
  const MuonInWater muons;
  const std::pair<double, double> rows[] = {{100, 31.04}, {200, 78.46}, {400, 178.5}, {1000, 470.7}, {4000, 1803}};
  for (const auto& [kinetic, expected] : rows) {
    check_relative("Bethe integrated, I = 75 eV", fmt::format("P27 muon range at {} MeV, g/cm2", kinetic), expected,
                   muons.range_cm(kinetic), 1e-2);
  }
}

constexpr Cylinder demo{1.35, 1.6};

TEST(LightDecayReference, mean_path_between_walls) {
  check_relative("Fry et al. 2006", "C15 4V/S of the demo tank, m", 1.464407, demo.mean_chord_m(), 1e-6);
  check_relative("own run of 2e6 photons", "C18 variance / mean^2 of the paths", 0.2821, chord_relative_variance(demo),
                 1e-2);
}

TEST(LightDecayReference, time_constant_lies_between_the_two_textbook_forms) {
  struct Row {
    double reflectivity, equal_paths, power_balance, monte_carlo;
  };
  const Row rows[] = {{0.85, 39.975, 43.311, 41.01}, {0.90, 61.662, 64.967, 62.72}, {0.95, 126.658, 129.934, 127.75}};
  for (const Row& row : rows) {
    const double got = wall_decay_time_ns(demo, row.reflectivity, 1.33);
    EXPECT_GT(got, row.equal_paths);    // C16, Fry et al. 2006
    EXPECT_LT(got, row.power_balance);  // C17
    check_relative("own run of 2e6 photons",
                   fmt::format("C18 decay time, n 1.33, reflectivity {}, ns", row.reflectivity), row.monte_carlo, got,
                   1e-2);
  }
}

TEST(LightDecayReference, absorption_adds_its_rate_exactly) {
  TankConfig tank;
  const double wall_ns = wall_decay_time_ns(demo, tank.wall_reflectivity, water_group_index);
  for (const double per_m : {0.01, 0.02, 0.05}) {
    tank.absorption_length_m = 1 / per_m;
    const double expected = 1 / (1 / wall_ns + per_m * light_speed_m_per_ns / water_group_index);
    check_relative("elementary", fmt::format("C19 decay time, absorption {} /m, ns", per_m), expected,
                   light_decay_time_ns(tank), 1e-9);
  }
  // C12: the group index, not the phase index, sets the time; 3.9 % longer.
  check_relative("IAPWS R9-97, 20 C, 0.40 um", "C12 group index", 1.38156, water_group_index, 1e-4);
}

}  // namespace
}  // namespace cistern
