#pragma once
/// \file
/// From photo-electrons to the waveform at the digitizer's input.

namespace cistern {

struct FrontendConfig {
  double counts_per_mv{2.048};       ///< 2^bits over the input range
  double pulse_height_mv{2.5};       ///< peak of a mean single photo-electron, shaped
  double shaping_time_ns{12};        ///< CR-(RC)^2 pulse (t/tau)^2 e^(-t/tau), tau
  double transit_time_spread_ns{2};  ///< Gaussian rms per photo-electron
  double charge_spread{0.35};        ///< relative rms of the single-photo-electron charge
  double noise_rms_mv{0.7};          ///< electronic noise after shaping
  double noise_correlation{0.5};     ///< of adjacent samples, 0 to 0.95
};

}  // namespace cistern
