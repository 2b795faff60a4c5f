#include "tests/performance/systemc_speed.hpp"

#include <chrono>
#include <systemc>

#include "firmware_model/trigger/trigger_module.hpp"
#include "traces/base/errors.hpp"

namespace cistern {
namespace {

constexpr double period_ns = 10;

TriggerSettings usual_trigger() {
  TriggerSettings settings;
  settings.name = "usual";
  settings.condition = {.kind = TriggerKind::TimeOverThreshold,
                        .baseline_counts = {200, 200, 200, 200},
                        .channel_enabled = {true, true, true, true},
                        .level_counts = {60, 60, 60, 60},
                        .window_samples = 150,
                        .min_samples_over = 21,
                        .sum_counts = {0, 0, 0, 0},
                        .majority = 2};
  return settings;
}

/// A trigger on wires that stay at the baseline.
class QuietBench : public sc_core::sc_module {
 public:
  explicit QuietBench(sc_core::sc_module_name name) : sc_core::sc_module(name), codes_("codes_wire", 4) {
    for (auto& wire : codes_) wire.write(200);
    trigger_.clock(clock_);
    trigger_.reset(reset_);
    trigger_.codes(codes_);
    trigger_.fire(fire_);
    trigger_.report(report_);
  }

  [[nodiscard]] bool fires() const { return fire_.read(); }

 private:
  sc_core::sc_clock clock_{"clock_wire", period_ns, sc_core::SC_NS};
  sc_core::sc_signal<bool> reset_{"reset_wire"};
  sc_core::sc_signal<bool> fire_{"fire_wire"};
  sc_core::sc_signal<FiringReport> report_{"report_wire"};
  sc_core::sc_vector<sc_core::sc_signal<std::int16_t>> codes_;
  TriggerModule trigger_{"trigger", usual_trigger()};
};

}  // namespace

double systemc_clocked_million_clocks_per_second(std::int64_t clocks) {
  static QuietBench bench("quiet_bench");
  const auto begin = std::chrono::steady_clock::now();
  sc_core::sc_start(period_ns * static_cast<double>(clocks), sc_core::SC_NS);
  const std::chrono::duration<double> elapsed = std::chrono::steady_clock::now() - begin;
  CISTERN_ASSERT(!bench.fires());
  return static_cast<double>(clocks) / elapsed.count() / 1e6;
}

}  // namespace cistern
