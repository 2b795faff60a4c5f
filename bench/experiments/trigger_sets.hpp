#pragma once
/// \file
/// Which triggers make up the station in service and the candidate station. A trigger without a
/// role belongs to both; a station fires when any trigger of its set does.
#include <array>
#include <cstddef>
#include <string_view>
#include <vector>

#include "firmware_model/trigger/settings.hpp"

namespace cistern {

enum class TriggerSet { InService, Candidate };
inline constexpr std::array<TriggerSet, 2> trigger_sets{TriggerSet::InService, TriggerSet::Candidate};

/// "in_service", "candidate": the subject in figure names.
[[nodiscard]] std::string_view name_of(TriggerSet set);

[[nodiscard]] bool belongs_to(const TriggerSettings& trigger, TriggerSet set);

/// Places in `triggers` of the set's members, in order; may be empty.
[[nodiscard]] std::vector<std::size_t> members_of(TriggerSet set, const std::vector<TriggerSettings>& triggers);

/// True when both sets have members and they differ: only then is there something to compare.
[[nodiscard]] bool are_comparable(const std::vector<TriggerSettings>& triggers);

}  // namespace cistern
