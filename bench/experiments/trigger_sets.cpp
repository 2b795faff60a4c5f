#include "bench/experiments/trigger_sets.hpp"

namespace cistern {

std::string_view name_of(TriggerSet set) { return set == TriggerSet::InService ? "in_service" : "candidate"; }

bool belongs_to(const TriggerSettings& trigger, TriggerSet set) {
  const TriggerRole own = set == TriggerSet::InService ? TriggerRole::InService : TriggerRole::Candidate;
  return trigger.role == TriggerRole::Both || trigger.role == own;
}

std::vector<std::size_t> members_of(TriggerSet set, const std::vector<TriggerSettings>& triggers) {
  std::vector<std::size_t> members;
  for (std::size_t i = 0; i < triggers.size(); ++i) {
    if (belongs_to(triggers[i], set)) members.push_back(i);
  }
  return members;
}

bool are_comparable(const std::vector<TriggerSettings>& triggers) {
  const auto in_service = members_of(TriggerSet::InService, triggers);
  const auto candidate = members_of(TriggerSet::Candidate, triggers);
  return !in_service.empty() && !candidate.empty() && in_service != candidate;
}

}  // namespace cistern
