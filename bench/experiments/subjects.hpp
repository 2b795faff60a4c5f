#pragma once
/// \file
/// Who figures are about: each trigger by its name, and each set of triggers as a station.
#include <string>
#include <vector>

#include "bench/experiments/efficiency.hpp"
#include "bench/experiments/trigger_sets.hpp"

namespace cistern {

struct Subject {
  std::string name;                  ///< "long", "in_service", "candidate"
  std::vector<std::size_t> members;  ///< places in the plan's triggers
  bool is_set{false};
};

/// The two sets first (where there is something to compare), then every trigger.
[[nodiscard]] std::vector<Subject> subjects_of(const std::vector<TriggerSettings>& triggers);

/// Without triggers that make up a whole station: what holds for one holds for the other.
[[nodiscard]] std::vector<Subject> distinct_subjects(const std::vector<TriggerSettings>& triggers);

/// For people: "station in service", "station with the candidate"; a trigger's own name.
[[nodiscard]] std::string title_of(const Subject& subject);

/// Per signal of the point: samples from onset to the subject's first firing; -1: none.
[[nodiscard]] std::vector<std::int32_t> delays_of(const Subject& subject, const PointResponses& point);

}  // namespace cistern
