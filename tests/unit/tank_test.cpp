#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

#include "traces/tank/cherenkov.hpp"
#include "traces/tank/cylinder.hpp"
#include "traces/tank/light_decay.hpp"
#include "traces/tank/light_sharing.hpp"
#include "traces/tank/muon_in_water.hpp"

namespace cistern {
namespace {

using std::numbers::pi;
constexpr Cylinder water{1.5, 1.2};

TEST(Cylinder, shows_its_top_from_above_and_a_rectangle_from_the_side) {
  EXPECT_DOUBLE_EQ(water.projected_area_m2(1), pi * 2.25);
  EXPECT_DOUBLE_EQ(water.projected_area_m2(0), 3 * 1.2);
}

TEST(Cylinder, measures_the_way_to_the_wall) {
  struct Row {
    const char* name;
    Vector3 from;
    Vector3 direction;
    double way_m;
  };
  const double diagonal = std::sqrt(0.5);
  const Row rows[] = {{"straight down", {0, 0, 1.2}, {0, 0, -1}, 1.2},
                      {"straight up", {0, 0, 0.2}, {0, 0, 1}, 1.0},
                      {"across", {-1.5, 0, 0.5}, {1, 0, 0}, 3.0},
                      {"from the side along a chord", {-1.5, 0, 0.5}, {diagonal, diagonal, 0}, 1.5 * std::sqrt(2)},
                      {"out of the floor", {0.3, 0, 0}, {0, 0, -1}, 0.0},
                      {"out of the side", {1.5, 0, 0.5}, {1, 0, 0}, 0.0},
                      {"floor before side", {0, 0, 1.2}, {diagonal, 0, -diagonal}, 1.2 * std::sqrt(2)},
                      {"side before floor", {1, 0, 1.2}, {diagonal, 0, -diagonal}, 0.5 * std::sqrt(2)}};
  for (const Row& row : rows) EXPECT_NEAR(water.way_to_wall_m(row.from, row.direction), row.way_m, 1e-12) << row.name;
}

TEST(Track, starts_on_the_wall_and_points_inside) {
  RandomStream stream(3, Purpose::PropertyTest, 0);
  for (int i = 0; i < 2000; ++i) {
    const Track track = draw_track(water, stream.uniform(), stream);
    const bool on_top = track.entry.z == water.depth_m;
    const bool on_side = std::abs(std::hypot(track.entry.x, track.entry.y) - water.radius_m) < 1e-12;
    ASSERT_TRUE(on_top || on_side);
    ASSERT_GE(track.length_m, 0);
    ASSERT_LE(track.length_m, std::hypot(3.0, 1.2) + 1e-12);
  }
}

TEST(Track, enters_through_the_top_when_vertical_and_through_the_side_when_horizontal) {
  RandomStream stream(4, Purpose::PropertyTest, 0);
  EXPECT_EQ(draw_track(water, 1, stream).entry.z, water.depth_m);
  EXPECT_LT(draw_track(water, 0, stream).entry.z, water.depth_m);
}

TEST(Cherenkov, starts_at_the_threshold) {
  const double beta_at_threshold = 1 / water_refractive_index;
  EXPECT_EQ(cherenkov_relative_yield(beta_at_threshold - 1e-6, water_refractive_index), 0);
  EXPECT_GT(cherenkov_relative_yield(beta_at_threshold + 1e-6, water_refractive_index), 0);
  EXPECT_EQ(cherenkov_relative_yield(1, water_refractive_index), 1);
}

TEST(MuonInWater, shines_along_its_whole_way_when_fast) {
  EXPECT_NEAR(MuonInWater().light_path_m(1000, 1.6), 1.6, 1e-4);
}

TEST(MuonInWater, makes_no_light_below_the_threshold) {
  EXPECT_EQ(MuonInWater().light_path_m(0.110, 1.6), 0);  // threshold: 0.1205 GeV/c
}

TEST(MuonInWater, makes_no_more_light_once_it_has_stopped) {
  const MuonInWater muons;
  const double light = muons.light_path_m(0.25, 1);  // stops after about half a metre
  EXPECT_GT(light, 0.1);
  EXPECT_DOUBLE_EQ(muons.light_path_m(0.25, 3), light);
}

TEST(MuonInWater, makes_more_light_the_faster_it_is) {
  const MuonInWater muons;
  double before = 0;
  for (const double momentum : {0.15, 0.2, 0.3, 0.5, 1.0, 5.0, 50.0}) {
    const double light = muons.light_path_m(momentum, 1.6);
    EXPECT_GT(light, before) << momentum;
    before = light;
  }
}

TEST(LightDecay, is_slower_with_better_walls_and_faster_with_worse_water) {
  const TankConfig tank;
  TankConfig bright = tank;
  bright.wall_reflectivity = 0.95;
  TankConfig murky = tank;
  murky.absorption_length_m = 20;
  EXPECT_GT(light_decay_time_ns(bright), light_decay_time_ns(tank));
  EXPECT_LT(light_decay_time_ns(murky), light_decay_time_ns(tank));
}

TEST(DirectLight, is_shared_equally_below_the_middle) {
  const TankConfig tank;
  const DirectLight light(tube_places(tank), vertical_central_track({tank.radius_m, tank.depth_m}));
  for (std::size_t t = 0; t < 4; ++t) EXPECT_NEAR(light.share(t), 0.25, 1e-12);
}

TEST(DirectLight, shares_add_up_to_one_and_favour_the_nearest_tube) {
  const TankConfig tank;
  const std::vector<Vector3> tubes = tube_places(tank);
  const DirectLight light(tubes, {tubes[2], {0, 0, -1}, tank.depth_m});
  double sum = 0;
  for (std::size_t t = 0; t < 4; ++t) {
    sum += light.share(t);
    EXPECT_TRUE(t == 2 || light.share(t) < light.share(2));
  }
  EXPECT_NEAR(sum, 1, 1e-12);
}

TEST(DirectLight, arrives_no_earlier_than_light_can_and_no_later_than_the_whole_way) {
  const TankConfig tank;
  const std::vector<Vector3> tubes = tube_places(tank);
  const DirectLight light(tubes, vertical_central_track({tank.radius_m, tank.depth_m}));
  RandomStream stream(5, Purpose::PropertyTest, 0);
  const double farthest_m = std::hypot(tank.tube_circle_radius_m, tank.depth_m);
  for (int i = 0; i < 1000; ++i) {
    const double delay_ns = light.draw_delay_ns(0, stream);
    ASSERT_GE(delay_ns, tank.tube_circle_radius_m * water_group_index / light_speed_m_per_ns);
    ASSERT_LE(delay_ns, (tank.depth_m + farthest_m * water_group_index) / light_speed_m_per_ns);
  }
}

}  // namespace
}  // namespace cistern
