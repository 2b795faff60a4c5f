#pragma once
/// \file
/// The shaped pulse of one photo-electron, and its charge.
#include <cstddef>
#include <cstdint>
#include <span>
#include <vector>

#include "traces/base/random.hpp"
#include "traces/frontend/frontend_config.hpp"

namespace cistern {

/// CR-(RC)^n response to an impulse, (t/tau)^n e^(-t/tau); 0 before t = 0.
[[nodiscard]] double shaped_pulse(double time_ns, double shaping_time_ns, int integrations);

/// The pulse of a mean photo-electron at the digitizer's sampling instants, tabulated for 16 arrival
/// times per sample; arrival times are rounded to these. Immutable once made.
class PulseShape {
 public:
  PulseShape(const FrontendConfig& config, double sample_rate_mhz);

  /// Adds a pulse that starts at `time` (in samples, 0 = samples[0]; may lie outside).
  void add(double time, float charge, std::span<float> samples) const;

  [[nodiscard]] std::size_t length() const noexcept { return length_; }  ///< samples it can touch
  [[nodiscard]] double area_counts() const;                              ///< sum over all samples, mean charge

 private:
  std::size_t length_;
  std::vector<float> counts_;  ///< [phase][sample]
};

/// Charges of single photo-electrons relative to their mean: gamma (Polya) distributed. Immutable.
class ChargeSpread {
 public:
  explicit ChargeSpread(double relative_rms);  ///< 0 to 1
  /// Mean 1 exactly.
  [[nodiscard]] float draw(RandomStream& stream) const { return charges_[stream.next_word() >> shift]; }

 private:
  static constexpr unsigned bits = 12;
  static constexpr unsigned shift = 32 - bits;
  std::vector<float> charges_;  ///< means of slices of equal probability
};

}  // namespace cistern
