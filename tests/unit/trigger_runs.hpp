#pragma once
/// \file
/// Triggers, codes and runs that the trigger tests share.
#include <cstdint>
#include <initializer_list>
#include <vector>

#include "firmware_model/trigger/firing.hpp"
#include "firmware_model/trigger/settings.hpp"
#include "traces/base/random.hpp"
#include "traces/waveform/codes.hpp"

namespace cistern {

inline constexpr std::uint64_t trigger_test_seed = 20260301;

/// Uniform integer in [low, high].
[[nodiscard]] std::int64_t whole(RandomStream& stream, std::int64_t low, std::int64_t high);

/// A case of its own for every kind and number.
[[nodiscard]] RandomStream trigger_case(TriggerKind kind, std::uint64_t number);

/// Baseline 100, level 10, window and length 4, 2 over, sum 20, majority 1, no hold-off, no prescale.
[[nodiscard]] TriggerSettings plain_trigger(TriggerKind kind, std::size_t channels = 1);

/// One channel after the other, as counts above the baseline of 100.
[[nodiscard]] Codes codes_above_baseline(std::initializer_list<std::vector<int>> channels);

/// Settings of every size, hold-off and mask; levels around which `random_codes` lingers, some below the
/// baseline or beyond every code.
[[nodiscard]] TriggerSettings random_settings(RandomStream& stream, TriggerKind kind);

/// Quiet stretches, walks around the level, and single spikes.
[[nodiscard]] Codes random_codes(RandomStream& stream, const ConditionSettings& condition, std::size_t samples);

[[nodiscard]] std::vector<Firing> by_specification(const TriggerSettings& settings, const Codes& codes);

/// \param longest_block  blocks of random length up to it; now and then a copy takes over
[[nodiscard]] std::vector<Firing> by_kernel(const TriggerSettings& settings, const Codes& codes, RandomStream& stream,
                                            std::int64_t longest_block);

/// All in one block. Fails the test unless specification and kernel agree.
[[nodiscard]] std::vector<Firing> by_both(const TriggerSettings& settings, const Codes& codes);

[[nodiscard]] std::vector<std::int64_t> samples_of(const std::vector<Firing>& firings);
[[nodiscard]] std::vector<std::int64_t> samples_of(const std::vector<Firing>& firings, FiringStatus status);

/// Where the first firing that differs stands, or -1.
[[nodiscard]] std::int64_t first_difference(const std::vector<Firing>& a, const std::vector<Firing>& b);

}  // namespace cistern
