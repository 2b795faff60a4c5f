#include "bench/experiments/efficiency.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "bench/campaign/packing.hpp"
#include "bench/results/figure.hpp"
#include "firmware_model/trigger/kernel.hpp"
#include "firmware_model/trigger/margin.hpp"
#include "traces/base/time.hpp"

namespace cistern {
namespace {

constexpr std::int32_t signals_per_unit = 50;

std::string condition_of(const SignalPlan& signal, double size_vem, double spread_ns) {
  std::string text = fmt::format("{}.{}_vem", signal.name, figure_number(size_vem));
  if (signal.spreads_ns.size() > 1) text += fmt::format(".{}_ns", figure_number(spread_ns));
  return text;
}

/// One trigger with what it takes to answer for one trace after another.
class Responder {
 public:
  Responder(const TriggerSettings& settings, const SignalFrame& frame)
      : kernel_(settings), meter_(settings.condition), frame_(frame) {}

  SignalResponse respond(const CodesView& codes) {
    firings_.clear();
    kernel_.reset();
    kernel_.process(codes, firings_);
    meter_.reset();
    meter_.process(codes);
    SignalResponse response;
    for (const Firing& firing : firings_) {
      const std::int64_t delay = firing.sample - frame_.onset;
      if (firing.status != FiringStatus::Passed || delay < 0 || delay > frame_.match) continue;
      response.delay_samples = static_cast<std::int32_t>(delay);
      break;
    }
    if (const auto best = meter_.best()) {
      response.margin = static_cast<std::int32_t>(std::clamp<std::int64_t>(best->margin, INT32_MIN, INT32_MAX));
    }
    return response;
  }

 private:
  TriggerKernel kernel_;
  MarginMeter meter_;
  SignalFrame frame_;
  std::vector<Firing> firings_;
};

}  // namespace

std::vector<SignalPoint> signal_points(const std::vector<SignalPlan>& signals) {
  std::vector<SignalPoint> points;
  for (std::size_t i = 0; i < signals.size(); ++i) {
    for (const double spread_ns : signals[i].spreads_ns) {
      for (const double size_vem : signals[i].sizes_vem) {
        points.push_back({i, {signals[i].kind, size_vem, spread_ns}, condition_of(signals[i], size_vem, spread_ns)});
      }
    }
  }
  return points;
}

SignalFrame signal_frame(const StationPlan& plan, const QualifyConfig& config) {
  const double rate_mhz = plan.digitizer.sample_rate_mhz;
  SignalFrame frame;
  frame.onset = std::max(samples_in_ns(config.spare_before_ns, rate_mhz), plan.longest_reach_samples);
  frame.match = samples_in_ns(config.match_window_ns, rate_mhz);
  frame.samples = static_cast<std::size_t>(frame.onset + frame.match + 1);
  return frame;
}

EfficiencyRun::EfficiencyRun(const StationPlan& plan, const QualifyConfig& config, const TraceGenerator& generator,
                             std::vector<SignalPoint> points, std::int32_t signals_per_point)
    : plan_(plan),
      generator_(generator),
      points_(std::move(points)),
      signals_per_point_(signals_per_point),
      units_per_point_((signals_per_point + signals_per_unit - 1) / signals_per_unit),
      frame_(signal_frame(plan, config)),
      responses_(points_.size()) {
  for (PointResponses& point : responses_) point.responses.resize(plan.triggers.size());
}

std::int64_t EfficiencyRun::units() const { return static_cast<std::int64_t>(points_.size()) * units_per_point_; }

void EfficiencyRun::make_codes(std::size_t point, std::int32_t index, Waveform& waveform, Codes& codes) const {
  // The number depends on the point and the index only, so that a quick run sees the first signals
  // of a full one.
  const std::uint64_t number = (static_cast<std::uint64_t>(point) << 32) | static_cast<std::uint32_t>(index);
  generator_.make_signal(points_[point].test, number, frame_.samples, frame_.onset, waveform);
  digitize(plan_.digitizer, waveform, codes);
}

Codes EfficiencyRun::codes_of(std::size_t point, std::int32_t index) const {
  Waveform waveform;
  Codes codes;
  make_codes(point, index, waveform, codes);
  return codes;
}

std::string EfficiencyRun::work(std::int64_t unit) const {
  const auto point = static_cast<std::size_t>(unit / units_per_point_);
  const auto first = static_cast<std::int32_t>(unit % units_per_point_) * signals_per_unit;
  const auto last = std::min(first + signals_per_unit, signals_per_point_);
  std::vector<Responder> responders;
  for (const TriggerSettings& trigger : without_prescale(plan_.triggers)) responders.emplace_back(trigger, frame_);
  std::vector<std::vector<SignalResponse>> responses(responders.size());
  Waveform waveform;
  Codes codes;
  for (std::int32_t index = first; index < last; ++index) {
    make_codes(point, index, waveform, codes);
    for (std::size_t t = 0; t < responders.size(); ++t) responses[t].push_back(responders[t].respond(codes.view()));
  }
  Packer packer;
  for (const auto& of_trigger : responses) packer.put_all(of_trigger);
  return packer.take();
}

void EfficiencyRun::merge(std::int64_t unit, std::string_view result) {
  Unpacker unpacker(result);
  for (auto& of_trigger : responses_[static_cast<std::size_t>(unit / units_per_point_)].responses) {
    const auto more = unpacker.get_all<SignalResponse>();
    of_trigger.insert(of_trigger.end(), more.begin(), more.end());
  }
}

}  // namespace cistern
