#pragma once
/// \file
/// Cherenkov light in water (Frank and Tamm 1937; Particle Data Group, "Passage of Particles").

namespace cistern {

/// Of water in the blue, common practice; taken as constant over the band that counts.
inline constexpr double water_refractive_index = 1.33;
/// n - lambda dn/dlambda at 20 degrees C and 0.40 um, from IAPWS R9-97: light pulses travel with it.
inline constexpr double water_group_index = 1.38156;
inline constexpr double light_speed_m_per_ns = 0.299792458;

/// Lorentz factor from which a particle shines.
[[nodiscard]] double cherenkov_threshold_gamma(double refractive_index);

/// sin^2 of the Cherenkov angle; 0 below the threshold. \param beta speed over that of light, (0, 1]
[[nodiscard]] double cherenkov_sin2(double beta, double refractive_index);

/// Light per length over that of a particle at beta = 1.
[[nodiscard]] double cherenkov_relative_yield(double beta, double refractive_index);

/// Photons per metre between two wavelengths, constant index.
[[nodiscard]] double cherenkov_photons_per_m(double beta, double refractive_index, double from_nm, double to_nm);

}  // namespace cistern
