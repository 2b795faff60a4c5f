#pragma once
/// \file
/// How often, how fast and by what margin each trigger fires on test signals of known size and
/// spread. Every trigger sees the same traces, so that triggers can be compared signal by signal.
#include <cstdint>
#include <string>
#include <string_view>
#include <vector>

#include "bench/experiments/station_plan.hpp"

namespace cistern {

/// One size and spread of one [[signal]].
struct SignalPoint {
  std::size_t signal{0};  ///< place in scenario.signals
  TestSignal test;
  std::string condition;  ///< in figure names: "muon.3_vem" or "shower.3_vem.400_ns"
};

/// Every size with every spread of every [[signal]], in scenario order.
[[nodiscard]] std::vector<SignalPoint> signal_points(const std::vector<SignalPlan>& signals);

/// What one trigger made of one signal.
struct SignalResponse {
  std::int32_t delay_samples{-1};  ///< onset to first firing inside the match window; -1: none
  std::int32_t margin{0};          ///< best of the trace (counts or samples), contract of `margins`
  [[nodiscard]] bool fired() const noexcept { return delay_samples >= 0; }
};

/// responses[trigger][i] is what a trigger made of the point's i-th signal.
struct PointResponses {
  std::vector<std::vector<SignalResponse>> responses;
};

/// Where a test signal lies in its trace, in samples.
struct SignalFrame {
  std::int64_t onset{0};  ///< far enough in that no window reaches before the trace
  std::int64_t match{0};  ///< a firing in [onset, onset + match] belongs to the signal
  std::size_t samples{0};
};
[[nodiscard]] SignalFrame signal_frame(const StationPlan& plan, const QualifyConfig& config);

/// Cut into units of at most 50 signals of one point.
class EfficiencyRun {
 public:
  /// Borrows all of it for its life.
  EfficiencyRun(const StationPlan& plan, const QualifyConfig& config, const TraceGenerator& generator,
                std::vector<SignalPoint> points, std::int32_t signals_per_point);

  [[nodiscard]] std::int64_t units() const;
  [[nodiscard]] std::string work(std::int64_t unit) const;
  void merge(std::int64_t unit, std::string_view result);

  [[nodiscard]] const std::vector<SignalPoint>& points() const noexcept { return points_; }
  [[nodiscard]] const PointResponses& responses(std::size_t point) const { return responses_[point]; }
  [[nodiscard]] const SignalFrame& frame() const noexcept { return frame_; }

  /// Makes the codes of one signal again, for a picture.
  [[nodiscard]] Codes codes_of(std::size_t point, std::int32_t index) const;

 private:
  void make_codes(std::size_t point, std::int32_t index, Waveform& waveform, Codes& codes) const;

  const StationPlan& plan_;
  const TraceGenerator& generator_;
  std::vector<SignalPoint> points_;
  std::int32_t signals_per_point_;
  std::int64_t units_per_point_;
  SignalFrame frame_;
  std::vector<PointResponses> responses_;
};

}  // namespace cistern
