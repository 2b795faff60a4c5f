#pragma once
/// \file
/// The rate at which each trigger, and the station with each set of triggers, fires on background:
/// live time cut into units that run anywhere and are joined in order, as if it had run in one go.
#include <array>
#include <cstdint>
#include <functional>
#include <memory>
#include <string>
#include <string_view>
#include <vector>

#include "bench/experiments/live_time.hpp"
#include "bench/experiments/station_plan.hpp"
#include "bench/experiments/trigger_sets.hpp"
#include "firmware_model/station/capture_book.hpp"
#include "firmware_model/trigger/firing.hpp"

namespace cistern {

/// What became of the firings of one station set.
struct SetTotals {
  std::int64_t firings{0};       ///< that passed every stage of their trigger
  std::int64_t captures{0};      ///< each becomes one tag
  std::int64_t merged{0};        ///< fell inside an open capture
  std::int64_t lost{0};          ///< no free buffer
  std::int64_t dead_samples{0};  ///< at which a firing would have been lost
  std::vector<std::int64_t> captures_per_block;
};

/// What one trigger did.
struct TriggerTotals {
  std::int64_t held_off{0};
  std::int64_t prescaled{0};
  std::int64_t disabled{0};
  std::vector<std::int64_t> firings_per_block;  ///< that passed every stage
};

class BackgroundRun {
 public:
  /// Told of every firing in order: trigger's place, the firing (samples of the whole live time).
  using FiringSink = std::function<void(std::size_t trigger, const Firing& firing)>;

  /// Borrows the plan for its life.
  BackgroundRun(const StationPlan& plan, const CaptureConfig& capture, const LiveTimePlan& time);

  [[nodiscard]] std::unique_ptr<LiveObserver> observe(std::int64_t unit) const;
  void merge(std::int64_t unit, std::string_view result, const FiringSink& sink);

  [[nodiscard]] double live_time_s() const;  ///< joined so far
  [[nodiscard]] const LiveTimePlan& time() const noexcept { return time_; }
  [[nodiscard]] const TriggerTotals& totals(std::size_t trigger) const { return triggers_[trigger]; }
  [[nodiscard]] const SetTotals& totals(TriggerSet set) const { return sets_[static_cast<std::size_t>(set)]; }

 private:
  class Observer;
  struct PlacedFiring;

  void prescale(PlacedFiring& firing);
  void capture(const PlacedFiring& firing);

  const StationPlan& plan_;
  LiveTimePlan time_;
  std::int64_t blocks_joined_{0};
  std::vector<std::int64_t> passed_hold_off_;  ///< per trigger, for the prescale
  std::vector<TriggerTotals> triggers_;
  std::array<SetTotals, 2> sets_;
  std::vector<CaptureBook> books_;  ///< one per set
};

}  // namespace cistern
