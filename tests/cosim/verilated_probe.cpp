#include "tests/cosim/verilated_probe.hpp"

#include <algorithm>
#include <array>
#include <cstring>
#include <limits>

#include "boxcar_sum_probe_16.h"
#include "boxcar_sum_probe_4.h"
#include "threshold_probe_16.h"
#include "threshold_probe_4.h"
#include "time_over_threshold_probe_16.h"
#include "time_over_threshold_probe_4.h"

/// Verilator's runtime asks for the time stamp of messages; the models have no time.
double sc_time_stamp() { return 0.0; }

namespace cistern {
namespace {

/// Follows one twin: counts the stretches where it is true and the real condition never is.
class NearMissCounter {
 public:
  void step(bool easier, bool real) {
    if (easier) {
      inside_ = true;
      real_seen_ = real_seen_ || real;
    } else {
      finish();
    }
  }
  std::int64_t finish() {
    if (inside_ && !real_seen_) ++count_;
    inside_ = false;
    real_seen_ = false;
    return count_;
  }

 private:
  bool inside_{false};
  bool real_seen_{false};
  std::int64_t count_{0};
};

/// Ports are packed little-endian words, channel 0 lowest: the layout of an array in memory.
template <typename Port, typename Value, std::size_t Count>
void set_port(Port& port, const std::array<Value, Count>& values) {
  static_assert(sizeof(Port) == sizeof(values));
  std::memcpy(&port, values.data(), sizeof(values));
}

template <typename Model, std::size_t Channels>
class ProbeOf final : public VerilatedProbe {
 public:
  ProbeOf() : model_(&context_) {}
  ~ProbeOf() override { model_.final(); }

  void configure(const TriggerSettings& settings) override {
    const ConditionSettings& condition = settings.condition;
    set_channels(condition);
    model_.majority = static_cast<std::uint8_t>(condition.majority);
    model_.reach_less_one = static_cast<std::uint16_t>(reach_samples(condition) - 1);
    model_.min_over = static_cast<std::uint32_t>(condition.min_samples_over);
    model_.hold_off = static_cast<std::uint32_t>(settings.firing.hold_off_samples);
    model_.rearm_level = settings.firing.rearm == Rearm::Level ? 1 : 0;
    model_.prescale = static_cast<std::uint32_t>(settings.firing.prescale);
    has_fewer_samples_ = condition.min_samples_over > 1;
    has_fewer_channels_ = condition.majority > 1;
  }

  ProbeRun run(const CodesView& codes) override {
    ProbeRun result;
    NearMissCounter count;
    NearMissCounter sample;
    NearMissCounter channel;
    clock(1);
    std::array<std::uint16_t, Channels> words{};
    for (std::size_t s = 0; s < codes.samples(); ++s) {
      for (std::size_t c = 0; c < codes.channels(); ++c) words[c] = static_cast<std::uint16_t>(codes.channel(c)[s]);
      set_port(model_.samples, words);
      clock(0);
      collect(static_cast<std::int64_t>(s), result.firings);
      const bool real = model_.condition != 0;
      count.step(model_.one_count_easier != 0, real);
      sample.step(has_fewer_samples_ && model_.one_sample_easier != 0, real);
      channel.step(has_fewer_channels_ && model_.one_channel_easier != 0, real);
    }
    result.near_misses = {count.finish(), sample.finish(), channel.finish()};
    return result;
  }

 private:
  void set_channels(const ConditionSettings& condition) {
    std::array<std::uint16_t, Channels> baseline{};
    std::array<std::int32_t, Channels> level{};
    std::array<std::int32_t, Channels> easier_level{};
    std::array<std::int64_t, Channels> sum{};
    std::array<std::int64_t, Channels> easier_sum{};
    unsigned mask = 0;
    for (std::size_t c = 0; c < condition.baseline_counts.size(); ++c) {
      baseline[c] = static_cast<std::uint16_t>(condition.baseline_counts[c]);
      level[c] = condition.level_counts[c];
      easier_level[c] = std::max(level[c], std::numeric_limits<std::int32_t>::min() + 1) - 1;
      sum[c] = condition.sum_counts[c];
      easier_sum[c] = sum[c] - 1;
      if (condition.channel_enabled[c]) mask |= 1U << c;
    }
    set_port(model_.baseline, baseline);
    set_port(model_.level, level);
    set_port(model_.easier_level, easier_level);
    set_port(model_.sum, sum);
    set_port(model_.easier_sum, easier_sum);
    model_.mask = static_cast<std::remove_reference_t<decltype(model_.mask)>>(mask);
  }

  void clock(int reset) {
    model_.rst = static_cast<std::uint8_t>(reset);
    model_.clk = 0;
    model_.eval();
    model_.clk = 1;
    model_.eval();
  }

  void collect(std::int64_t sample, std::vector<ProbeFiring>& firings) const {
    if (model_.fire) firings.push_back({sample, FiringStatus::Passed});
    if (model_.held_off) firings.push_back({sample, FiringStatus::HeldOff});
    if (model_.prescaled) firings.push_back({sample, FiringStatus::Prescaled});
  }

  VerilatedContext context_;
  Model model_;
  bool has_fewer_samples_{false};
  bool has_fewer_channels_{false};
};

}  // namespace

std::unique_ptr<VerilatedProbe> make_probe(TriggerKind kind, int channels) {
  CISTERN_ASSERT(channels == 4 || channels == 16);
  const bool wide = channels == 16;
  switch (kind) {
    case TriggerKind::Threshold:
      if (wide) return std::make_unique<ProbeOf<threshold_probe_16, 16>>();
      return std::make_unique<ProbeOf<threshold_probe_4, 4>>();
    case TriggerKind::TimeOverThreshold:
      if (wide) return std::make_unique<ProbeOf<time_over_threshold_probe_16, 16>>();
      return std::make_unique<ProbeOf<time_over_threshold_probe_4, 4>>();
    case TriggerKind::BoxcarSum:
      break;
  }
  if (wide) return std::make_unique<ProbeOf<boxcar_sum_probe_16, 16>>();
  return std::make_unique<ProbeOf<boxcar_sum_probe_4, 4>>();
}

}  // namespace cistern
