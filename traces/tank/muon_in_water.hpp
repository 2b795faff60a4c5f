#pragma once
/// \file
/// How muons slow down in water, and how much light they make on the way.
#include <vector>

namespace cistern {

/// Mean electronic energy loss of a muon in water, MeV cm^2/g: Bethe with the density effect, mean
/// excitation energy 75 eV and Sternheimer's parameters for water, all as in Groom, Mokhov and
/// Striganov 2001. The muon's own radiation, which matters above 100 GeV, is left out.
/// \param kinetic_mev >= 1
[[nodiscard]] double muon_stopping_power(double kinetic_mev);

/// Range and light of muons, tabulated. Immutable once made.
class MuonInWater {
 public:
  MuonInWater();

  /// Way to rest in water of 1 g/cm^3, continuous slowing down. \param kinetic_mev 1 to 10^7
  [[nodiscard]] double range_cm(double kinetic_mev) const;

  /// Length of track that makes as much light at beta = 1 as the muon does on its way of at most
  /// `length_m`; it may stop before. What comes after a stop (the decay electron) is not counted.
  [[nodiscard]] double light_path_m(double momentum_gev, double length_m) const;

 private:
  [[nodiscard]] double light_of_range(double range_cm) const;
  std::vector<double> log_kinetic_mev_;
  std::vector<double> range_cm_;
  std::vector<double> light_cm_;  ///< light path of a muon from that energy until it rests
};

}  // namespace cistern
