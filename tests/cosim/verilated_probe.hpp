#pragma once
/// \file
/// The Verilated reference triggers behind one interface: settings go to ports, so any settings
/// run without compiling anything.
#include <cstdint>
#include <memory>
#include <vector>

#include "firmware_model/trigger/firing.hpp"
#include "firmware_model/trigger/settings.hpp"
#include "traces/waveform/codes.hpp"

namespace cistern {

/// What the Verilog said of one sample; only samples with a firing of some status are kept.
struct ProbeFiring {
  std::int64_t sample{0};
  FiringStatus status{FiringStatus::Passed};
  bool operator==(const ProbeFiring&) const = default;
};

/// Stretches in which a twin that is easier by one was true and the real condition never was.
struct NearMisses {
  std::int64_t one_count{0};
  std::int64_t one_sample{0};
  std::int64_t one_channel{0};
};

struct ProbeRun {
  std::vector<ProbeFiring> firings;
  NearMisses near_misses;
};

/// One simulated trigger. Not thread-safe.
class VerilatedProbe {
 public:
  virtual ~VerilatedProbe() = default;
  /// Sets the ports; what is over them belongs to the next run.
  virtual void configure(const TriggerSettings& settings) = 0;
  /// Resets, then clocks every sample through. The codes have as many channels as the settings.
  [[nodiscard]] virtual ProbeRun run(const CodesView& codes) = 0;
};

/// \param channels  4 or 16: how many the simulated circuit has; the settings may have fewer.
[[nodiscard]] std::unique_ptr<VerilatedProbe> make_probe(TriggerKind kind, int channels);

}  // namespace cistern
