#include "bench/experiments/subjects.hpp"

#include <algorithm>

namespace cistern {

std::vector<Subject> subjects_of(const std::vector<TriggerSettings>& triggers) {
  std::vector<Subject> subjects;
  for (const TriggerSet set : trigger_sets) {
    if (are_comparable(triggers)) subjects.push_back({std::string(name_of(set)), members_of(set, triggers), true});
  }
  for (std::size_t t = 0; t < triggers.size(); ++t) subjects.push_back({triggers[t].name, {t}, false});
  return subjects;
}

std::vector<Subject> distinct_subjects(const std::vector<TriggerSettings>& triggers) {
  const auto subjects = subjects_of(triggers);
  std::vector<Subject> distinct;
  for (const Subject& subject : subjects) {
    const bool is_whole_station =
        !subject.is_set && std::any_of(subjects.begin(), subjects.end(), [&](const Subject& other) {
          return other.is_set && other.members == subject.members;
        });
    if (!is_whole_station) distinct.push_back(subject);
  }
  return distinct;
}

std::string title_of(const Subject& subject) {
  if (!subject.is_set) return subject.name;
  return subject.name == "candidate" ? "station with the candidate" : "station in service";
}

std::vector<std::int32_t> delays_of(const Subject& subject, const PointResponses& point) {
  std::vector<std::int32_t> delays(point.responses.empty() ? 0 : point.responses.front().size(), -1);
  for (const std::size_t member : subject.members) {
    for (std::size_t i = 0; i < delays.size(); ++i) {
      const SignalResponse& response = point.responses[member][i];
      if (response.fired() && (delays[i] < 0 || response.delay_samples < delays[i])) delays[i] = response.delay_samples;
    }
  }
  return delays;
}

}  // namespace cistern
