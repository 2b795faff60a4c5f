#pragma once
/// \file
/// How fast diffuse light dies out between the walls. Derivation: docs/physics.md.
#include "traces/tank/cylinder.hpp"
#include "traces/tank/tank_config.hpp"

namespace cistern {

/// Variance over squared mean of the chords that start uniformly on the wall with Lambert's cosine
/// law, by quadrature: how unequal the light's ways from wall to wall are.
[[nodiscard]] double chord_relative_variance(const Cylinder& water);

/// 1/e time of light lost at the walls alone: (n d / c) / ln(1/rho) for equal ways d = 4V/S, and to
/// first order in ln(1/rho) longer for unequal ones. \param reflectivity in (0, 1)
[[nodiscard]] double wall_decay_time_ns(const Cylinder& water, double reflectivity, double index);

/// With absorption in the water: the rates add.
[[nodiscard]] double light_decay_time_ns(const TankConfig& tank);

}  // namespace cistern
