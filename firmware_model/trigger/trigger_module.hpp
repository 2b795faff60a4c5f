#pragma once
/// \file
/// A trigger as a clocked SystemC process. On each rising edge it reads one sample from its ports, asks the
/// specification, and writes what it says. Nothing is decided here.
#include <cstdint>
#include <iosfwd>
#include <string>
#include <systemc>
#include <vector>

#include "firmware_model/trigger/firing.hpp"
#include "firmware_model/trigger/settings.hpp"
#include "firmware_model/trigger/specification.hpp"

namespace cistern {

/// What the trigger says about one sample, as a signal can carry it.
struct FiringReport {
  bool present{false};
  Firing firing;
  bool operator==(const FiringReport&) const = default;
};
std::ostream& operator<<(std::ostream& out, const FiringReport& report);
void sc_trace(sc_core::sc_trace_file* file, const FiringReport& report, const std::string& name);

class TriggerModule : public sc_core::sc_module {
 public:
  sc_core::sc_in<bool> clock{"clock"};
  sc_core::sc_in<bool> reset{"reset"};  ///< active high, synchronous; the first edge without it takes sample 0
  sc_core::sc_vector<sc_core::sc_in<std::int16_t>> codes;
  sc_core::sc_out<bool> fire{"fire"};              ///< a firing that passed, one clock long, one register late
  sc_core::sc_out<FiringReport> report{"report"};  ///< any firing, stopped ones too

  /// Bug if the settings are not valid.
  TriggerModule(sc_core::sc_module_name name, const TriggerSettings& settings);

 private:
  void on_clock();

  TriggerSpecification specification_;
  std::vector<std::int16_t> sample_;
};

}  // namespace cistern
