#pragma once
/// \file
/// Intensity of atmospheric muons at the ground: the surface parametrisation of Guan et al. 2015
/// (arXiv:1509.06176, equations 2 and 3, table 1), which holds at sea level and all zenith angles,
/// with an altitude factor from attenuation lengths (Heisinger et al. 2002 after the balloon data
/// of Boezio et al. 2000). Published for 0.5 to 6,000 GeV; below 0.5 GeV it is an extrapolation.
#include "traces/particles/muon_config.hpp"

namespace cistern {

inline constexpr double muon_mass_gev = 0.1056583755;  // Particle Data Group
/// Upper end of the published range; above it fall fewer than one muon in 10^6.
inline constexpr double muon_momentum_max_gev = 6000;

/// Total energy in GeV of a muon of the given momentum in GeV/c.
[[nodiscard]] double muon_energy_gev(double momentum_gev);

/// Cosine of the zenith angle where the muons are produced: the Earth is round. \param cos_zenith 0 to 1
[[nodiscard]] double production_cos_zenith(double cos_zenith);

/// Sea-level intensity per m^2, s, sr and GeV of *total* energy.
[[nodiscard]] double sea_level_intensity(double energy_gev, double cos_zenith);

/// Mass above a site, p/g0 of the US Standard Atmosphere 1976, g/cm^2. \param altitude_m 0 to 11,000
[[nodiscard]] double atmospheric_depth(double altitude_m);

/// Intensity at the altitude over that at sea level. \param altitude_m 0 to 2,500
[[nodiscard]] double altitude_factor(double momentum_gev, double altitude_m);

/// Intensity at the site per m^2, s, sr and GeV/c of momentum; the momentum limit is not applied.
[[nodiscard]] double muon_intensity(const MuonConfig& config, double momentum_gev, double cos_zenith);

}  // namespace cistern
