#include "bench/experiments/logic_check.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "bench/experiments/boundary_stimuli.hpp"
#include "firmware_model/trigger/kernel.hpp"
#include "firmware_model/trigger/specification.hpp"

namespace cistern {
namespace {

constexpr std::size_t random_samples = 200'000;

/// The condition alone: nothing may stop a firing on its way.
TriggerSettings unhindered(const TriggerSettings& trigger) {
  TriggerSettings settings = trigger;
  settings.firing = FiringSettings{};
  return settings;
}

void add_rows(const TriggerSettings& trigger, const DigitizerConfig& digitizer, LogicCheck& check) {
  TriggerKernel kernel(unhindered(trigger));
  for (const BoundaryStimulus& stimulus : boundary_stimuli(trigger.condition, digitizer)) {
    std::vector<Firing> firings;
    kernel.reset();
    kernel.process(stimulus.codes.view(), firings);
    check.rows.push_back({trigger.name, stimulus.description, stimulus.should_fire, !firings.empty()});
  }
}

/// A walk that lingers around the codes where the condition changes its mind.
Codes random_codes(const TriggerSettings& trigger, const DigitizerConfig& digitizer, std::uint64_t seed,
                   std::uint64_t index) {
  RandomStream stream(seed, Purpose::Demonstration, index);
  const ConditionSettings& condition = trigger.condition;
  Codes codes(condition.baseline_counts.size(), random_samples);
  for (std::size_t c = 0; c < codes.channels(); ++c) {
    const double edge = condition.kind == TriggerKind::BoxcarSum
                            ? static_cast<double>(condition.sum_counts[c]) / condition.length_samples
                            : static_cast<double>(condition.level_counts[c]);
    double offset = 0;
    for (std::int16_t& code : codes.channel(c)) {
      offset += 0.1 * (edge - offset) + stream.uniform(-2, 2) + (stream.uniform() < 0.02 ? stream.uniform(-12, 12) : 0);
      code = static_cast<std::int16_t>(
          std::clamp(condition.baseline_counts[c] + static_cast<std::int32_t>(offset), 0, largest_code(digitizer)));
    }
  }
  return codes;
}

std::vector<Firing> by_specification(const TriggerSettings& trigger, const Codes& codes) {
  TriggerSpecification specification(trigger);
  std::vector<Firing> firings;
  std::vector<std::int16_t> sample(codes.channels());
  for (std::size_t s = 0; s < codes.samples(); ++s) {
    for (std::size_t c = 0; c < codes.channels(); ++c) sample[c] = codes.channel(c)[s];
    if (const auto firing = specification.step(sample)) firings.push_back(*firing);
  }
  return firings;
}

LogicAgreement compare(const TriggerSettings& trigger, const Codes& codes) {
  const auto expected = by_specification(trigger, codes);
  std::vector<Firing> got;
  TriggerKernel kernel(trigger);
  kernel.process(codes.view(), got);
  LogicAgreement agreement{trigger.name, static_cast<std::int64_t>(codes.samples()),
                           static_cast<std::int64_t>(expected.size()), 0};
  const std::size_t both = std::min(expected.size(), got.size());
  for (std::size_t i = 0; i < both; ++i) agreement.differences += expected[i] == got[i] ? 0 : 1;
  agreement.differences += static_cast<std::int64_t>(std::max(expected.size(), got.size()) - both);
  return agreement;
}

}  // namespace

bool LogicCheck::passed() const {
  return std::all_of(rows.begin(), rows.end(), [](const LogicRow& row) { return row.should_fire == row.fired; }) &&
         std::all_of(agreements.begin(), agreements.end(), [](const LogicAgreement& a) { return a.differences == 0; });
}

LogicCheck check_logic(const StationPlan& plan, std::uint64_t seed) {
  LogicCheck check;
  std::uint64_t index = 0;
  for (const TriggerSettings& trigger : plan.triggers) {
    if (const std::string why = why_never_true(trigger.condition, plan.digitizer); !why.empty()) {
      check.warnings.push_back(fmt::format("{} can never fire: {}", trigger.name, why));
    }
    add_rows(trigger, plan.digitizer, check);
    check.agreements.push_back(compare(trigger, random_codes(trigger, plan.digitizer, seed, index++)));
  }
  return check;
}

}  // namespace cistern
