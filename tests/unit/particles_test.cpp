#include <gtest/gtest.h>

#include "traces/particles/muon_flux.hpp"
#include "traces/particles/muon_sampler.hpp"

namespace cistern {
namespace {

double unit_area(double) { return 1; }

TEST(MuonFlux, does_not_change_with_altitude_at_sea_level) { EXPECT_DOUBLE_EQ(altitude_factor(1, 0), 1); }

TEST(MuonFlux, grows_with_altitude_and_most_at_low_momentum) {
  EXPECT_GT(altitude_factor(1, 1000), altitude_factor(1, 500));
  EXPECT_GT(altitude_factor(0.3, 1000), altitude_factor(3, 1000));
}

TEST(MuonFlux, is_finite_at_the_horizon) { EXPECT_GT(sea_level_intensity(10, 0), 0); }

TEST(MuonFlux, per_momentum_is_less_than_per_energy_by_the_speed) {
  const MuonConfig sea_level{.altitude_m = 0};
  const double energy = muon_energy_gev(0.2);
  EXPECT_DOUBLE_EQ(muon_intensity(sea_level, 0.2, 1), sea_level_intensity(energy, 1) * 0.2 / energy);
}

TEST(MuonSampler, rate_follows_the_flux_scale) {
  const MuonSampler one({.flux_scale = 1}, unit_area);
  const MuonSampler three({.flux_scale = 3}, unit_area);
  EXPECT_NEAR(three.rate_hz() / one.rate_hz(), 3, 1e-9);
}

TEST(MuonSampler, rate_follows_the_area) {
  const MuonSampler one({}, unit_area);
  const MuonSampler two({}, [](double) { return 2.0; });
  EXPECT_NEAR(two.rate_hz() / one.rate_hz(), 2, 1e-9);
}

TEST(MuonSampler, has_no_rate_without_a_flux) {
  const MuonSampler none({.flux_scale = 0}, unit_area);
  EXPECT_EQ(none.rate_hz(), 0);
}

TEST(MuonSampler, stays_above_the_momentum_limit_and_the_horizon) {
  const MuonSampler sampler({.momentum_min_gev = 1}, unit_area);
  RandomStream stream(1, Purpose::PropertyTest, 0);
  for (int i = 0; i < 10'000; ++i) {
    const Muon muon = sampler.draw(stream);
    ASSERT_GE(muon.momentum_gev, 1);
    ASSERT_LE(muon.momentum_gev, muon_momentum_max_gev);
    ASSERT_GT(muon.cos_zenith, 0);
    ASSERT_LT(muon.cos_zenith, 1);
  }
}

TEST(MuonSampler, draws_only_directions_the_body_is_seen_from) {
  const MuonSampler sampler({}, [](double cos_zenith) { return cos_zenith > 0.5 ? 1.0 : 0.0; });
  RandomStream stream(2, Purpose::PropertyTest, 0);
  for (int i = 0; i < 10'000; ++i) ASSERT_GT(sampler.draw(stream).cos_zenith, 0.5);
}

}  // namespace
}  // namespace cistern
