#pragma once
/// \file
/// Live time of one station: cut into counting blocks, blocks into units of work, and made block by
/// block of samples with a run-up, so that a unit is worked as if the time before it had been too.
#include <cstdint>
#include <memory>
#include <string>
#include <string_view>
#include <vector>

#include "bench/experiments/station_plan.hpp"
#include "traces/waveform/codes.hpp"

namespace cistern {

/// How a live time is cut. All lengths in samples.
class LiveTimePlan {
 public:
  /// Both times are rounded: the block to whole samples, the live time to whole blocks (at least one).
  LiveTimePlan(double live_time_s, double block_s, const StationPlan& station);

  [[nodiscard]] std::int64_t blocks() const noexcept { return blocks_; }
  [[nodiscard]] std::int64_t units() const noexcept { return (blocks_ + blocks_per_unit_ - 1) / blocks_per_unit_; }
  [[nodiscard]] std::int64_t first_block(std::int64_t unit) const noexcept { return unit * blocks_per_unit_; }
  [[nodiscard]] std::int64_t end_block(std::int64_t unit) const noexcept;
  [[nodiscard]] std::int64_t first_sample(std::int64_t unit) const { return first_block(unit) * samples_per_block_; }
  [[nodiscard]] std::int64_t end_sample(std::int64_t unit) const { return end_block(unit) * samples_per_block_; }
  /// Where the triggers start: long enough before the unit for every window to fill and one
  /// hold-off to pass, so that they are in the state they would have had without the cut.
  [[nodiscard]] std::int64_t run_up_start(std::int64_t unit) const;
  [[nodiscard]] std::int64_t block_of(std::int64_t sample) const noexcept { return sample / samples_per_block_; }
  [[nodiscard]] double block_s() const;

 private:
  double sample_rate_hz_;
  std::int64_t samples_per_block_;
  std::int64_t blocks_;
  std::int64_t blocks_per_unit_;
  std::int64_t run_up_samples_;
};

/// Watches the samples of one unit, from the start of its run-up, in a worker process.
class LiveObserver {
 public:
  virtual ~LiveObserver() = default;
  /// One piece of some thousand samples; pieces come in order, none left out.
  virtual void take(const CodesView& codes) = 0;
  /// What was seen, as bytes for the observer's own merge.
  [[nodiscard]] virtual std::string finish() = 0;
};

/// Makes and digitizes the background of one unit once, for all observers.
/// \return what each of them saw, packed; see `unpack_observed`
[[nodiscard]] std::string observe_live_unit(const StationPlan& plan, const TraceGenerator& generator,
                                            const LiveTimePlan& time, std::int64_t unit,
                                            std::vector<std::unique_ptr<LiveObserver>> observers);
[[nodiscard]] std::vector<std::string> unpack_observed(std::string_view bytes, std::size_t observers);

}  // namespace cistern
