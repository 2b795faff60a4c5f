#pragma once
/// \file
/// What became of one signal in the end: exactly one of these, in the order of the chain.
#include <array>
#include <cstddef>
#include <string_view>

namespace cistern {

enum class Fate {
  StationUnpowered,
  StationNotRunning,
  TriggerOff,
  BelowLevel,
  TooFewChannels,
  TooFewSamples,
  BelowSum,
  HeldOff,
  NoEdge,
  NoFiring,
  Prescaled,
  Merged,
  Cut,
  NoFreeBuffer,
  RejectedAtStation,
  TagQueueFull,
  TagLost,
  TagLate,
  TimeRefused,
  CentralDown,
  NoCoincidence,
  NotRequested,
  RequestLost,
  CaptureExpired,
  CaptureLost,
  ReadoutLost,
  StoreFailed,
  Delivered,
};

inline constexpr std::size_t fate_count = static_cast<std::size_t>(Fate::Delivered) + 1;

/// The word used in tables and reports, for example "below_level".
[[nodiscard]] std::string_view name_of(Fate fate);

/// All fates, first stage first.
[[nodiscard]] const std::array<Fate, fate_count>& all_fates();

}  // namespace cistern
