#pragma once
/// \file
/// The water as a vertical cylinder, and straight tracks through it.
/// Coordinates in metres: z upwards from the middle of the floor.
#include "traces/base/random.hpp"

namespace cistern {

struct Vector3 {
  double x{0};
  double y{0};
  double z{0};
};

struct Cylinder {
  double radius_m;
  double depth_m;

  [[nodiscard]] double volume_m3() const;
  [[nodiscard]] double surface_m2() const;
  /// Mean chord of isotropic lines, 4V/S (Cauchy 1850): also the light's mean path between walls.
  [[nodiscard]] double mean_chord_m() const;
  /// Area of the shadow in a beam of the given cosine of zenith, 0 to 1.
  [[nodiscard]] double projected_area_m2(double cos_zenith) const;
  /// From a point inside or on the wall to the wall along a unit direction.
  [[nodiscard]] double way_to_wall_m(const Vector3& from, const Vector3& direction) const;
};

/// A straight piece of a particle's way inside the water.
struct Track {
  Vector3 entry;
  Vector3 direction;  ///< unit vector
  double length_m;
};

/// Track of one particle out of a uniform parallel beam with random azimuth: enters through the top
/// or the side, and ends where it leaves the water. \param cos_zenith 0 to 1, falling downwards
[[nodiscard]] Track draw_track(const Cylinder& water, double cos_zenith, RandomStream& stream);

/// Through the middle, from the surface to the floor.
[[nodiscard]] Track vertical_central_track(const Cylinder& water);

/// Vertical from a uniformly drawn point of the surface to the floor.
[[nodiscard]] Track draw_vertical_track(const Cylinder& water, RandomStream& stream);

}  // namespace cistern
