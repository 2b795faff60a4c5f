#include "bench/experiments/background.hpp"

#include <algorithm>

#include "bench/campaign/packing.hpp"
#include "firmware_model/trigger/kernel.hpp"

namespace cistern {
/// A firing on its way between processes; samples of the whole live time.
struct BackgroundRun::PlacedFiring {
  std::int64_t sample;
  std::int64_t onset_sample;
  std::int32_t trigger;
  FiringStatus status;
  bool start_unknown;
};

class BackgroundRun::Observer : public LiveObserver {
 public:
  Observer(const std::vector<TriggerSettings>& triggers, std::int64_t start, std::int64_t first)
      : start_(start), first_(first) {
    for (const TriggerSettings& trigger : triggers) kernels_.emplace_back(trigger);
  }

  void take(const CodesView& codes) override {
    for (std::size_t t = 0; t < kernels_.size(); ++t) {
      firings_.clear();
      kernels_[t].process(codes, firings_);
      for (const Firing& firing : firings_) {
        if (start_ + firing.sample < first_) continue;  // seen in the run-up only
        placed_.push_back({start_ + firing.sample, start_ + firing.onset_sample, static_cast<std::int32_t>(t),
                           firing.status, firing.start_unknown});
      }
    }
  }

  std::string finish() override {
    std::stable_sort(placed_.begin(), placed_.end(),
                     [](const PlacedFiring& a, const PlacedFiring& b) { return a.sample < b.sample; });
    Packer packer;
    packer.put_all(placed_);
    return packer.take();
  }

 private:
  std::int64_t start_;
  std::int64_t first_;
  std::vector<TriggerKernel> kernels_;
  std::vector<Firing> firings_;
  std::vector<PlacedFiring> placed_;
};

BackgroundRun::BackgroundRun(const StationPlan& plan, const CaptureConfig& capture, const LiveTimePlan& time)
    : plan_(plan), time_(time), passed_hold_off_(plan.triggers.size(), 0), triggers_(plan.triggers.size()) {
  const auto blocks = static_cast<std::size_t>(time_.blocks());
  for (TriggerTotals& totals : triggers_) totals.firings_per_block.assign(blocks, 0);
  for (SetTotals& totals : sets_) totals.captures_per_block.assign(blocks, 0);
  for (std::size_t i = 0; i < sets_.size(); ++i) books_.emplace_back(capture);
}

std::unique_ptr<LiveObserver> BackgroundRun::observe(std::int64_t unit) const {
  return std::make_unique<Observer>(without_prescale(plan_.triggers), time_.run_up_start(unit),
                                    time_.first_sample(unit));
}

void BackgroundRun::prescale(PlacedFiring& firing) {
  const auto trigger = static_cast<std::size_t>(firing.trigger);
  if (firing.status != FiringStatus::Passed) return;
  if (++passed_hold_off_[trigger] % plan_.triggers[trigger].firing.prescale != 0)
    firing.status = FiringStatus::Prescaled;
}

void BackgroundRun::capture(const PlacedFiring& firing) {
  const auto block = static_cast<std::size_t>(time_.block_of(firing.sample));
  for (const TriggerSet set : trigger_sets) {
    if (!belongs_to(plan_.triggers[static_cast<std::size_t>(firing.trigger)], set)) continue;
    SetTotals& totals = sets_[static_cast<std::size_t>(set)];
    ++totals.firings;
    switch (books_[static_cast<std::size_t>(set)].take(firing.sample).outcome) {
      case CaptureOutcome::Captured:
        ++totals.captures;
        ++totals.captures_per_block[block];
        break;
      case CaptureOutcome::NoFreeBuffer: ++totals.lost; break;
      default: ++totals.merged;
    }
  }
}

void BackgroundRun::merge(std::int64_t unit, std::string_view result, const FiringSink& sink) {
  auto placed = Unpacker(result).get_all<PlacedFiring>();
  for (PlacedFiring& firing : placed) {
    const auto trigger = static_cast<std::size_t>(firing.trigger);
    prescale(firing);
    TriggerTotals& totals = triggers_[trigger];
    switch (firing.status) {
      case FiringStatus::Passed:
        ++totals.firings_per_block[static_cast<std::size_t>(time_.block_of(firing.sample))];
        capture(firing);
        break;
      case FiringStatus::HeldOff: ++totals.held_off; break;
      case FiringStatus::Prescaled: ++totals.prescaled; break;
      default: ++totals.disabled;
    }
    sink(trigger, {firing.sample, firing.onset_sample, firing.status, firing.start_unknown});
  }
  blocks_joined_ = time_.end_block(unit);
  for (const TriggerSet set : trigger_sets) {
    sets_[static_cast<std::size_t>(set)].dead_samples =
        books_[static_cast<std::size_t>(set)].dead_samples(time_.end_sample(unit));
  }
}

double BackgroundRun::live_time_s() const { return static_cast<double>(blocks_joined_) * time_.block_s(); }

}  // namespace cistern
