#pragma once
/// \file
/// Which tube sees how much of a track's direct light, and how late. The diffuse rest is shared
/// equally, since by then the walls have mixed it.
#include <array>
#include <cstddef>
#include <vector>

#include "traces/base/random.hpp"
#include "traces/tank/cylinder.hpp"
#include "traces/tank/tank_config.hpp"

namespace cistern {

inline constexpr std::size_t tubes_max = 16;

/// Tubes look straight down from the water's surface, evenly on a circle.
[[nodiscard]] std::vector<Vector3> tube_places(const TankConfig& tank);

/// The direct light of one track. A piece of track shines on a tube as the cosine to the tube's axis
/// over the squared distance; the shares of all tubes add up to 1.
class DirectLight {
 public:
  DirectLight(const std::vector<Vector3>& tubes, const Track& track);

  [[nodiscard]] double share(std::size_t tube) const { return shares_[tube]; }
  /// From the particle's entry to a direct photon's arrival at the tube, ns.
  [[nodiscard]] double draw_delay_ns(std::size_t tube, RandomStream& stream) const;

 private:
  static constexpr std::size_t pieces = 16;
  struct Piece {
    double weight;
    double delay_ns;
  };
  std::array<double, tubes_max> shares_{};
  std::array<std::array<Piece, pieces>, tubes_max> pieces_;
};

}  // namespace cistern
