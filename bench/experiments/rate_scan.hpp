#pragma once
/// \file
/// Background firings of many variants of each trigger on the same live time: the rate against its
/// level (or sum) and against the samples over that it asks for.
#include <cstdint>
#include <memory>
#include <string>
#include <string_view>
#include <vector>

#include "bench/experiments/live_time.hpp"
#include "bench/experiments/station_plan.hpp"

namespace cistern {

enum class ScanAxis { Level, SamplesOver };

/// One trigger with one setting changed.
struct RateVariant {
  std::size_t trigger{0};  ///< place in the plan
  ScanAxis axis{ScanAxis::Level};
  double x{0};            ///< factor on the level or sum, or samples over
  std::string condition;  ///< in figure names: "level_1p25", "samples_over_30"
  TriggerSettings settings;
};

/// Level factors for every trigger, samples over for every time-over-threshold trigger. Prescale is
/// left out: a rate against level is one of the condition and its hold-off.
[[nodiscard]] std::vector<RateVariant> rate_variants(const StationPlan& plan, const RateConfig& config);

class RateScan {
 public:
  RateScan(std::vector<RateVariant> variants, const LiveTimePlan& time);

  [[nodiscard]] std::unique_ptr<LiveObserver> observe(std::int64_t unit) const;
  /// Units in number order.
  void merge(std::string_view result);

  [[nodiscard]] const std::vector<RateVariant>& variants() const noexcept { return variants_; }
  [[nodiscard]] const std::vector<std::int64_t>& firings_per_block(std::size_t variant) const {
    return firings_per_block_[variant];
  }
  [[nodiscard]] const LiveTimePlan& time() const noexcept { return time_; }

 private:
  class Observer;

  std::vector<RateVariant> variants_;
  LiveTimePlan time_;
  std::vector<std::vector<std::int64_t>> firings_per_block_;
};

}  // namespace cistern
