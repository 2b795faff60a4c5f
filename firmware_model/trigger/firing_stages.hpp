#pragma once
/// \file
/// What stands between an edge of the condition and a firing that passes: enable, hold-off,
/// prescale, in this order. The one statement of these rules for every kind of trigger.
#include <cstdint>
#include <optional>

#include "firmware_model/trigger/firing.hpp"
#include "firmware_model/trigger/settings.hpp"

namespace cistern {

/// Copyable, so that a state can be kept and gone back to.
class FiringStages {
 public:
  explicit FiringStages(const FiringSettings& settings) : settings_(settings) {}
  void reset() { *this = FiringStages(settings_); }

  /// Judges a firing at `sample`; samples must rise. A disabled firing starts no hold-off; a
  /// suppressed one does not prolong it; one that the prescale stops was let through by hold-off.
  [[nodiscard]] FiringStatus judge(std::int64_t sample) {
    if (!settings_.enabled) return FiringStatus::Disabled;
    if (last_let_through_ && *last_let_through_ >= sample - settings_.hold_off_samples) return FiringStatus::HeldOff;
    last_let_through_ = sample;
    return ++let_through_ % settings_.prescale == 0 ? FiringStatus::Passed : FiringStatus::Prescaled;
  }

  /// Rearm::Level only: the sample at which a condition that is still true fires again, the first
  /// one after hold-off; nothing before the first firing that hold-off let through.
  [[nodiscard]] std::optional<std::int64_t> refire_sample() const {
    if (settings_.rearm != Rearm::Level || !last_let_through_) return {};
    return *last_let_through_ + settings_.hold_off_samples + 1;
  }

 private:
  FiringSettings settings_;
  std::optional<std::int64_t> last_let_through_;
  std::int64_t let_through_{0};
};

}  // namespace cistern
