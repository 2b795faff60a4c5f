#include "bench/experiments/rate_scan.hpp"

#include <fmt/format.h>

#include "bench/campaign/packing.hpp"
#include "bench/results/figure.hpp"
#include "firmware_model/trigger/kernel.hpp"
#include "traces/base/rounding.hpp"

namespace cistern {
namespace {

template <typename Count>
void scale(std::vector<Count>& counts, double factor) {
  for (Count& count : counts) count = static_cast<Count>(round_half_up(static_cast<double>(count) * factor));
}

RateVariant level_variant(const StationPlan& plan, std::size_t trigger, double factor) {
  RateVariant variant{trigger, ScanAxis::Level, factor, "level_" + figure_number(factor), plan.triggers[trigger]};
  scale(variant.settings.condition.level_counts, factor);
  scale(variant.settings.condition.sum_counts, factor);
  variant.settings.firing.prescale = 1;
  return variant;
}

RateVariant samples_variant(const StationPlan& plan, std::size_t trigger, std::int32_t samples) {
  RateVariant variant{trigger, ScanAxis::SamplesOver, static_cast<double>(samples),
                      fmt::format("samples_over_{}", samples), plan.triggers[trigger]};
  variant.settings.condition.min_samples_over = samples;
  variant.settings.firing.prescale = 1;
  return variant;
}

}  // namespace

std::vector<RateVariant> rate_variants(const StationPlan& plan, const RateConfig& config) {
  std::vector<RateVariant> variants;
  for (std::size_t t = 0; t < plan.triggers.size(); ++t) {
    for (const double factor : config.level_factors) variants.push_back(level_variant(plan, t, factor));
    const ConditionSettings& condition = plan.triggers[t].condition;
    if (condition.kind != TriggerKind::TimeOverThreshold) continue;
    for (const std::int32_t samples : config.min_samples_over) {
      if (samples <= condition.window_samples) variants.push_back(samples_variant(plan, t, samples));
    }
  }
  return variants;
}

class RateScan::Observer : public LiveObserver {
 public:
  Observer(const std::vector<RateVariant>& variants, const LiveTimePlan& time, std::int64_t unit)
      : time_(time),
        first_block_(time.first_block(unit)),
        first_(time.first_sample(unit)),
        start_(time.run_up_start(unit)) {
    for (const RateVariant& variant : variants) kernels_.emplace_back(variant.settings);
    counts_.assign(kernels_.size(),
                   std::vector<std::int64_t>(static_cast<std::size_t>(time.end_block(unit) - first_block_), 0));
  }

  void take(const CodesView& codes) override {
    for (std::size_t v = 0; v < kernels_.size(); ++v) {
      firings_.clear();
      kernels_[v].process(codes, firings_);
      for (const Firing& firing : firings_) {
        const std::int64_t sample = start_ + firing.sample;
        if (firing.status != FiringStatus::Passed || sample < first_) continue;
        ++counts_[v][static_cast<std::size_t>(time_.block_of(sample) - first_block_)];
      }
    }
  }

  std::string finish() override {
    Packer packer;
    for (const auto& of_variant : counts_) packer.put_all(of_variant);
    return packer.take();
  }

 private:
  const LiveTimePlan& time_;
  std::int64_t first_block_;
  std::int64_t first_;
  std::int64_t start_;
  std::vector<TriggerKernel> kernels_;
  std::vector<Firing> firings_;
  std::vector<std::vector<std::int64_t>> counts_;
};

RateScan::RateScan(std::vector<RateVariant> variants, const LiveTimePlan& time)
    : variants_(std::move(variants)), time_(time), firings_per_block_(variants_.size()) {}

std::unique_ptr<LiveObserver> RateScan::observe(std::int64_t unit) const {
  return std::make_unique<Observer>(variants_, time_, unit);
}

void RateScan::merge(std::string_view result) {
  Unpacker unpacker(result);
  for (auto& of_variant : firings_per_block_) {
    const auto more = unpacker.get_all<std::int64_t>();
    of_variant.insert(of_variant.end(), more.begin(), more.end());
  }
}

}  // namespace cistern
