#pragma once
/// \file
/// The tank: a vertical cylinder of water with equal tubes looking down at it from its top.
#include <cstdint>

namespace cistern {

struct TankConfig {
  double radius_m{1.35};
  double depth_m{1.6};
  std::int32_t tubes{4};              ///< evenly on a circle; four make a square
  double tube_circle_radius_m{0.75};  ///< of the circle the tubes sit on, <= radius
  double photo_electrons_per_vem_and_tube{55};
  double wall_reflectivity{0.92};      ///< diffuse, in (0, 1)
  double absorption_length_m{60};      ///< of the water for the light that counts
  double direct_light_fraction{0.12};  ///< light seen before the first reflection, [0, 1)
};

}  // namespace cistern
