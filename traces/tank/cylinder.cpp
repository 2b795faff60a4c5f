#include "traces/tank/cylinder.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <numbers>

namespace cistern {
namespace {

using std::numbers::pi;

Vector3 draw_point_of_disc(double radius_m, double z, RandomStream& stream) {
  const double r = radius_m * std::sqrt(stream.uniform());
  const double azimuth = stream.uniform(0, 2 * pi);
  return {r * std::cos(azimuth), r * std::sin(azimuth), z};
}

/// A parallel beam meets the side with a density that goes as the cosine of the angle between the
/// beam and the wall's normal, so that its sine is uniform.
Vector3 draw_point_of_side(const Cylinder& water, double beam_azimuth, RandomStream& stream) {
  const double from_beam = std::asin(stream.uniform(-1, 1));
  const double azimuth = beam_azimuth + pi + from_beam;
  const double z = stream.uniform(0, water.depth_m);
  return {water.radius_m * std::cos(azimuth), water.radius_m * std::sin(azimuth), z};
}

}  // namespace

double Cylinder::volume_m3() const { return pi * radius_m * radius_m * depth_m; }
double Cylinder::surface_m2() const { return 2 * pi * radius_m * (radius_m + depth_m); }
double Cylinder::mean_chord_m() const { return 4 * volume_m3() / surface_m2(); }

double Cylinder::projected_area_m2(double cos_zenith) const {
  const double sin_zenith = std::sqrt(std::max(0.0, 1 - cos_zenith * cos_zenith));
  return pi * radius_m * radius_m * cos_zenith + 2 * radius_m * depth_m * sin_zenith;
}

double Cylinder::way_to_wall_m(const Vector3& from, const Vector3& direction) const {
  double way = std::numeric_limits<double>::infinity();
  if (direction.z < 0) way = from.z / -direction.z;
  if (direction.z > 0) way = (depth_m - from.z) / direction.z;
  const double a = direction.x * direction.x + direction.y * direction.y;
  if (a > 0) {
    // The larger root of |from + way * direction| = radius in the horizontal plane.
    const double half_b = from.x * direction.x + from.y * direction.y;
    const double c = from.x * from.x + from.y * from.y - radius_m * radius_m;
    way = std::min(way, (-half_b + std::sqrt(std::max(0.0, half_b * half_b - a * c))) / a);
  }
  return std::max(0.0, way);
}

Track draw_track(const Cylinder& water, double cos_zenith, RandomStream& stream) {
  const double sin_zenith = std::sqrt(std::max(0.0, 1 - cos_zenith * cos_zenith));
  const double azimuth = stream.uniform(0, 2 * pi);
  const Vector3 direction{sin_zenith * std::cos(azimuth), sin_zenith * std::sin(azimuth), -cos_zenith};
  const double top_area = pi * water.radius_m * water.radius_m * cos_zenith;
  const bool through_top = stream.uniform() * water.projected_area_m2(cos_zenith) < top_area;
  const Vector3 entry = through_top ? draw_point_of_disc(water.radius_m, water.depth_m, stream)
                                    : draw_point_of_side(water, azimuth, stream);
  return {entry, direction, water.way_to_wall_m(entry, direction)};
}

Track vertical_central_track(const Cylinder& water) { return {{0, 0, water.depth_m}, {0, 0, -1}, water.depth_m}; }

Track draw_vertical_track(const Cylinder& water, RandomStream& stream) {
  return {draw_point_of_disc(water.radius_m, water.depth_m, stream), {0, 0, -1}, water.depth_m};
}

}  // namespace cistern
