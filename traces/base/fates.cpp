#include "traces/base/fates.hpp"

namespace cistern {
namespace {
constexpr std::array<std::string_view, fate_count> names{
    "station_unpowered",
    "station_not_running",
    "trigger_off",
    "below_level",
    "too_few_channels",
    "too_few_samples",
    "below_sum",
    "held_off",
    "no_edge",
    "no_firing",
    "prescaled",
    "merged",
    "cut",
    "no_free_buffer",
    "rejected_at_station",
    "tag_queue_full",
    "tag_lost",
    "tag_late",
    "time_refused",
    "central_down",
    "no_coincidence",
    "not_requested",
    "request_lost",
    "capture_expired",
    "capture_lost",
    "readout_lost",
    "store_failed",
    "delivered",
};
}  // namespace

std::string_view name_of(Fate fate) { return names[static_cast<std::size_t>(fate)]; }

const std::array<Fate, fate_count>& all_fates() {
  static const auto fates = [] {
    std::array<Fate, fate_count> list{};
    for (std::size_t i = 0; i < fate_count; ++i) list[i] = static_cast<Fate>(i);
    return list;
  }();
  return fates;
}

}  // namespace cistern
