#include "traces/tank/light_decay.hpp"

#include <cmath>
#include <numbers>

#include "traces/base/errors.hpp"
#include "traces/tank/cherenkov.hpp"

namespace cistern {
namespace {

constexpr int steps = 48;  // per dimension; the variance is then good to 0.2 %

double middle_of(int i) { return (i + 0.5) / steps; }

/// Mean of the squared chord from one wall point over Lambert's cosine law about its inner normal.
/// `along` and `across` are two directions in the wall.
double mean_squared_chord(const Cylinder& water, const Vector3& point, const Vector3& normal, const Vector3& along,
                          const Vector3& across) {
  double sum = 0;
  for (int i = 0; i < steps; ++i) {
    const double sine = std::sqrt(middle_of(i));
    const double cosine = std::sqrt(1 - middle_of(i));
    for (int k = 0; k < steps; ++k) {
      const double azimuth = 2 * std::numbers::pi * middle_of(k);
      const double u = sine * std::cos(azimuth);
      const double v = sine * std::sin(azimuth);
      const double way = water.way_to_wall_m(
          point, {cosine * normal.x + u * along.x + v * across.x, cosine * normal.y + u * along.y + v * across.y,
                  cosine * normal.z + u * along.z + v * across.z});
      sum += way * way;
    }
  }
  return sum / (steps * steps);
}

}  // namespace

double chord_relative_variance(const Cylinder& water) {
  double floor = 0;
  double side = 0;
  for (int i = 0; i < steps; ++i) {
    const Vector3 on_floor{water.radius_m * std::sqrt(middle_of(i)), 0, 0};
    const Vector3 on_side{water.radius_m, 0, water.depth_m * middle_of(i)};
    floor += mean_squared_chord(water, on_floor, {0, 0, 1}, {1, 0, 0}, {0, 1, 0}) / steps;
    side += mean_squared_chord(water, on_side, {-1, 0, 0}, {0, 1, 0}, {0, 0, 1}) / steps;
  }
  const double floor_share = water.radius_m / (water.radius_m + water.depth_m);  // floor and surface together
  const double mean = water.mean_chord_m();
  return (floor_share * floor + (1 - floor_share) * side) / (mean * mean) - 1;
}

double wall_decay_time_ns(const Cylinder& water, double reflectivity, double index) {
  CISTERN_ASSERT(reflectivity > 0 && reflectivity < 1);
  const double loss = -std::log(reflectivity);
  const double way_time_ns = index * water.mean_chord_m() / light_speed_m_per_ns;
  return way_time_ns / loss * (1 + 0.5 * chord_relative_variance(water) * loss);
}

double light_decay_time_ns(const TankConfig& tank) {
  CISTERN_ASSERT(tank.absorption_length_m > 0);
  const double wall_ns = wall_decay_time_ns({tank.radius_m, tank.depth_m}, tank.wall_reflectivity, water_group_index);
  const double water_ns = tank.absorption_length_m * water_group_index / light_speed_m_per_ns;
  return 1 / (1 / wall_ns + 1 / water_ns);
}

}  // namespace cistern
