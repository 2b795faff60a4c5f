#pragma once
/// \file
/// The atmospheric muons at the site.

namespace cistern {

struct MuonConfig {
  double altitude_m{880};        ///< 0 to 2,500
  double momentum_min_gev{0.2};  ///< muons below it are left out, GeV/c
  double flux_scale{1};          ///< factor on the published flux, > 0
};

}  // namespace cistern
