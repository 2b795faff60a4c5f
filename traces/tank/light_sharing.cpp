#include "traces/tank/light_sharing.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>

#include "traces/base/errors.hpp"
#include "traces/tank/cherenkov.hpp"

namespace cistern {
namespace {

/// Keeps the weight finite where a track meets a tube: about a tube's own radius. Assumed; twice or
/// half of it changes the share of a tube under a vertical track by a few per cent.
constexpr double tube_softening_m = 0.12;

}  // namespace

std::vector<Vector3> tube_places(const TankConfig& tank) {
  CISTERN_ASSERT(tank.tubes >= 1 && static_cast<std::size_t>(tank.tubes) <= tubes_max);
  std::vector<Vector3> places;
  for (std::int32_t t = 0; t < tank.tubes; ++t) {
    const double azimuth = 2 * std::numbers::pi * (t + 0.5) / tank.tubes;
    places.push_back(
        {tank.tube_circle_radius_m * std::cos(azimuth), tank.tube_circle_radius_m * std::sin(azimuth), tank.depth_m});
  }
  return places;
}

DirectLight::DirectLight(const std::vector<Vector3>& tubes, const Track& track) {
  double total = 0;
  for (std::size_t t = 0; t < tubes.size(); ++t) {
    for (std::size_t i = 0; i < pieces; ++i) {
      const double way = track.length_m * (static_cast<double>(i) + 0.5) / pieces;
      const double below = tubes[t].z - (track.entry.z + way * track.direction.z);
      const double distance = std::hypot(tubes[t].x - (track.entry.x + way * track.direction.x),
                                         tubes[t].y - (track.entry.y + way * track.direction.y), below);
      const double softened = std::hypot(distance, tube_softening_m);
      const double weight = std::max(below, 0.0) / (softened * softened * softened);
      pieces_[t][i] = {weight, (way + distance * water_group_index) / light_speed_m_per_ns};
      shares_[t] += weight;
    }
    total += shares_[t];
  }
  for (std::size_t t = 0; t < tubes.size(); ++t) {
    shares_[t] = total > 0 ? shares_[t] / total : 1 / static_cast<double>(tubes.size());
  }
}

double DirectLight::draw_delay_ns(std::size_t tube, RandomStream& stream) const {
  double sum = 0;
  for (const Piece& piece : pieces_[tube]) sum += piece.weight;
  double left = stream.uniform() * sum;
  std::size_t i = 0;
  while (i + 1 < pieces && left >= pieces_[tube][i].weight) left -= pieces_[tube][i++].weight;
  return pieces_[tube][i].delay_ns;
}

}  // namespace cistern
