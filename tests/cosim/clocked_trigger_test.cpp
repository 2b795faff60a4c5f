/// \file
/// One statement of each rule, three ways to run it: the clocked SystemC trigger, the specification stepped by a plain
/// loop, and the fast kernel report the same firings, field by field, on random and boundary traces.
#include <fmt/format.h>
#include <gtest/gtest.h>

#include <algorithm>
#include <memory>
#include <systemc>
#include <vector>

#include "firmware_model/trigger/kernel.hpp"
#include "firmware_model/trigger/specification.hpp"
#include "firmware_model/trigger/trigger_module.hpp"
#include "tests/cosim/own_process.hpp"
#include "tests/cosim/random_triggers.hpp"
#include "tests/cosim/stimuli.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t seed = 20'260'714;
constexpr int settings_per_kind = 120;
constexpr std::size_t samples_per_trace = 24'000;
constexpr std::int64_t least_firings = 100'000;

/// Settings, and traces that start from reset each.
struct Case {
  TriggerSettings settings;
  std::vector<Codes> traces;
};

/// Independent samples around the value that decides: level, or sum divided by length.
Codes random_trace(const ConditionSettings& condition, RandomStream& stream) {
  Codes codes(condition.baseline_counts.size(), samples_per_trace);
  for (std::size_t c = 0; c < codes.channels(); ++c) {
    const bool sums = condition.kind == TriggerKind::BoxcarSum;
    const std::int64_t height = sums ? condition.sum_counts[c] / condition.length_samples : condition.level_counts[c];
    for (std::int16_t& code : codes.channel(c)) {
      code = static_cast<std::int16_t>(
          std::clamp<std::int64_t>(condition.baseline_counts[c] + height + between(stream, -9, 8), 0, 4'095));
    }
  }
  return codes;
}

Case random_case(TriggerKind kind, int number) {
  RandomStream stream = case_stream(seed, kind, number);
  Case result{random_trigger(kind, number % 8 == 7 ? 16 : 4, stream), {}};
  const ConditionSettings& condition = result.settings.condition;
  result.traces.push_back(boundary_trace(condition, samples_per_trace, stream));
  result.traces.push_back(random_trace(condition, stream));
  result.traces.push_back(boundary_trace(condition, samples_per_trace, stream));
  return result;
}

using Firings = std::vector<Firing>;

Firings specification_firings(const TriggerSettings& settings, CodesView codes) {
  TriggerSpecification specification(settings);
  Firings firings;
  std::vector<std::int16_t> sample(codes.channels());
  for (std::size_t s = 0; s < codes.samples(); ++s) {
    for (std::size_t c = 0; c < codes.channels(); ++c) sample[c] = codes.channel(c)[s];
    if (const auto firing = specification.step(sample)) firings.push_back(*firing);
  }
  return firings;
}

/// The trace handed over in blocks of random length.
Firings kernel_firings(const TriggerSettings& settings, CodesView codes, RandomStream& stream) {
  TriggerKernel kernel(settings);
  Firings firings;
  for (std::size_t at = 0; at < codes.samples();) {
    const auto wanted = static_cast<std::size_t>(between(stream, 1, one_in(stream, 4) ? 40 : 9'000));
    const std::size_t count = std::min(wanted, codes.samples() - at);
    kernel.process(codes.part(at, count), firings);
    at += count;
  }
  return firings;
}

/// Plays the traces of one case to a trigger module, with one clock of reset before each, and notes its reports.
class Player : public sc_core::sc_module {
 public:
  sc_core::sc_in<bool> clock{"clock"};

  Player(sc_core::sc_module_name name, const Case& the_case)
      : sc_core::sc_module(name),
        firings(the_case.traces.size()),
        case_(the_case),
        codes_("codes_wire", the_case.settings.condition.baseline_counts.size()),
        trigger_("trigger", the_case.settings) {
    trigger_.clock(clock);
    trigger_.reset(reset_);
    trigger_.codes(codes_);
    trigger_.fire(fire_);
    trigger_.report(report_);
    SC_HAS_PROCESS(Player);
    SC_METHOD(on_falling_edge);
    sensitive << clock.neg();
  }

  std::vector<Firings> firings;       ///< per trace
  std::int64_t disagreeing_wires{0};  ///< clocks at which `fire` was not what the report says

 private:
  /// Halfway between two rising edges: hears about the sample put on the wires before, then puts the next.
  void on_falling_edge() {
    if (trace_ == case_.traces.size()) return;
    const bool passed = report_.read().present && report_.read().firing.status == FiringStatus::Passed;
    disagreeing_wires += fire_.read() != passed ? 1 : 0;
    if (report_.read().present) firings[trace_].push_back(report_.read().firing);
    const bool ended = next_ == case_.traces[trace_].samples();
    reset_.write(ended);
    if (ended) {
      ++trace_;
      next_ = 0;
      return;
    }
    for (std::size_t c = 0; c < codes_.size(); ++c) codes_[c].write(case_.traces[trace_].view().channel(c)[next_]);
    ++next_;
  }

  const Case& case_;
  sc_core::sc_signal<bool> reset_{"reset_wire"};
  sc_core::sc_signal<bool> fire_{"fire_wire"};
  sc_core::sc_signal<FiringReport> report_{"report_wire"};
  sc_core::sc_vector<sc_core::sc_signal<std::int16_t>> codes_;
  TriggerModule trigger_;
  std::size_t trace_{0};
  std::size_t next_{0};
};

/// All cases side by side on one clock.
std::vector<std::unique_ptr<Player>> play(const std::vector<Case>& cases) {
  sc_core::sc_clock clock("clock", 10, sc_core::SC_NS, 0.5, 5, sc_core::SC_NS, true);
  std::vector<std::unique_ptr<Player>> players;
  for (const Case& the_case : cases) {
    players.push_back(std::make_unique<Player>(sc_core::sc_gen_unique_name("player"), the_case));
    players.back()->clock(clock);
  }
  const auto clocks = static_cast<double>(cases.front().traces.size() * (samples_per_trace + 2));
  sc_core::sc_start(10 * clocks, sc_core::SC_NS);
  return players;
}

struct Totals {
  std::int64_t passed{0};
  std::int64_t stopped{0};
};

void compare(TriggerKind kind, const Case& the_case, int number, const Player& player, Totals& totals) {
  RandomStream stream = case_stream(seed + 1, kind, number);
  EXPECT_EQ(player.disagreeing_wires, 0);
  for (std::size_t t = 0; t < the_case.traces.size(); ++t) {
    const CodesView codes = the_case.traces[t].view();
    const Firings specified = specification_firings(the_case.settings, codes);
    const std::string place = fmt::format("seed {}, {} {}, trace {}", seed, name_of(kind), number, t);
    EXPECT_TRUE(player.firings[t] == specified) << place << ": clocked differs from specification";
    EXPECT_TRUE(kernel_firings(the_case.settings, codes, stream) == specified)
        << place << ": kernel differs from specification";
    for (const Firing& firing : specified) {
      ++(firing.status == FiringStatus::Passed ? totals.passed : totals.stopped);
    }
  }
}

void compare_three_ways(TriggerKind kind) {
  std::vector<Case> cases;
  for (int k = 0; k < settings_per_kind; ++k) cases.push_back(random_case(kind, k));
  const auto players = play(cases);
  Totals totals;
  for (int k = 0; k < settings_per_kind; ++k) {
    compare(kind, cases[static_cast<std::size_t>(k)], k, *players[static_cast<std::size_t>(k)], totals);
  }
  fmt::print("{}: {} settings, {} clocks, {} firings passed, {} stopped, the same three ways\n", name_of(kind),
             settings_per_kind, settings_per_kind * 3 * samples_per_trace, totals.passed, totals.stopped);
  EXPECT_GE(totals.passed, least_firings);
  EXPECT_GT(totals.stopped, 0);
}

TEST(ClockedTrigger, threshold_fires_as_specification_and_kernel) {
  in_own_process([] { compare_three_ways(TriggerKind::Threshold); });
}

TEST(ClockedTrigger, time_over_threshold_fires_as_specification_and_kernel) {
  in_own_process([] { compare_three_ways(TriggerKind::TimeOverThreshold); });
}

TEST(ClockedTrigger, boxcar_sum_fires_as_specification_and_kernel) {
  in_own_process([] { compare_three_ways(TriggerKind::BoxcarSum); });
}

}  // namespace
}  // namespace cistern
