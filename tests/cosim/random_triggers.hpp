#pragma once
/// \file
/// Random trigger settings for the outside checks: small values that meet often, the limits of
/// the ranges now and then.
#include <cstdint>

#include "firmware_model/trigger/settings.hpp"
#include "traces/base/random.hpp"

namespace cistern {

/// Uniform integer in [low, high].
[[nodiscard]] std::int64_t between(RandomStream& stream, std::int64_t low, std::int64_t high);

/// True once in `odds` draws.
[[nodiscard]] bool one_in(RandomStream& stream, std::int64_t odds);

/// The random numbers of one case of a kind of trigger.
[[nodiscard]] RandomStream case_stream(std::uint64_t seed, TriggerKind kind, int number);

/// Valid settings for 1 to `most_channels` channels. Baselines leave room for 12-bit codes on both
/// sides of level and baseline, except for rare levels beyond every code.
[[nodiscard]] TriggerSettings random_trigger(TriggerKind kind, std::int64_t most_channels, RandomStream& stream);

}  // namespace cistern
