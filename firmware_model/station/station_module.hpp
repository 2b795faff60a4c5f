#pragma once
/// \file
/// One station as SystemC modules: sampling clock, digitizer pipeline, trigger bank, capture electronics.
/// Thin shells: each process reads ports, calls pure logic, writes ports. Clock by clock: docs/station.md.
#include <cstdint>
#include <exception>
#include <memory>
#include <systemc>
#include <vector>

#include "firmware_model/station/capture_unit.hpp"
#include "firmware_model/station/station_run.hpp"
#include "firmware_model/trigger/trigger_module.hpp"

namespace cistern {

/// Rising edge k at the sampling instant of sample k, computed from k alone; the falling edge is halfway to the next.
class SamplingClock : public sc_core::sc_module {
 public:
  sc_core::sc_out<bool> clock{"clock"};
  SamplingClock(sc_core::sc_module_name name, double sample_rate_mhz);

 private:
  void toggle();
  double sample_rate_mhz_;
  std::int64_t edge_{0};  ///< rising edges so far
  bool high_{false};
};

/// Plays codes: sample k appears after rising edge k + latency and stays for one clock.
class DigitizerModule : public sc_core::sc_module {
 public:
  sc_core::sc_in<bool> clock{"clock"};
  sc_core::sc_vector<sc_core::sc_out<std::int16_t>> codes;
  sc_core::sc_out<bool> valid{"valid"};  ///< a sample is on the codes
  sc_core::sc_out<bool> reset{"reset"};  ///< no sample has come yet

  /// \param view  borrowed for the simulation
  DigitizerModule(sc_core::sc_module_name name, const DigitizerConfig& config, CodesView view);

  /// What a process threw; it stopped the simulation.
  [[nodiscard]] std::exception_ptr failure() const { return failure_; }

 private:
  void on_clock();
  void put(std::size_t sample);

  CodesView view_;
  std::int16_t largest_code_;
  std::int64_t next_;  ///< sample of the next edge; negative while the pipeline fills
  std::exception_ptr failure_;
};

/// Takes each sample and the reports about the sample before it: fires first, then stores.
class CaptureModule : public sc_core::sc_module {
 public:
  sc_core::sc_in<bool> clock{"clock"};
  sc_core::sc_vector<sc_core::sc_in<std::int16_t>> codes;
  sc_core::sc_in<bool> valid{"valid"};
  sc_core::sc_vector<sc_core::sc_in<FiringReport>> reports;  ///< one per trigger
  sc_core::sc_out<bool> busy{"busy"};                        ///< every buffer is taken

  CaptureModule(sc_core::sc_module_name name, const StationConfig& config, std::size_t triggers);

  /// Copies out what is left. \return what happened so far
  [[nodiscard]] StationRun finish();

 private:
  void on_clock();
  void take_reports();
  [[nodiscard]] StationFiring firing_of(std::size_t trigger, const Firing& firing) const;

  StationConfig config_;
  CaptureUnit unit_;
  std::vector<std::int16_t> sample_;
  std::vector<StationFiring> firings_;
  std::int64_t stored_{0};
};

/// The modules above and the wires between them.
class StationModule : public sc_core::sc_module {
 public:
  StationModule(sc_core::sc_module_name name, const StationConfig& config, const std::vector<TriggerSettings>& triggers,
                CodesView view);

  [[nodiscard]] std::exception_ptr failure() const { return digitizer_.failure(); }
  [[nodiscard]] StationRun finish() { return capture_.finish(); }

 private:
  void wire_triggers(const std::vector<TriggerSettings>& triggers);

  sc_core::sc_signal<bool> clock_{"clock_wire"};
  sc_core::sc_signal<bool> valid_{"valid_wire"};
  sc_core::sc_signal<bool> reset_{"reset_wire", true};
  sc_core::sc_signal<bool> busy_{"busy_wire"};
  sc_core::sc_vector<sc_core::sc_signal<std::int16_t>> codes_;
  sc_core::sc_vector<sc_core::sc_signal<bool>> fires_;
  sc_core::sc_vector<sc_core::sc_signal<FiringReport>> reports_;
  SamplingClock sampling_clock_;
  DigitizerModule digitizer_;
  std::vector<std::unique_ptr<TriggerModule>> triggers_;
  CaptureModule capture_;
};

/// Simulated time since the start, exact at any length. (A double in picoseconds is not, after 2.5 hours.)
[[nodiscard]] sc_core::sc_time exact_time_ns(std::int64_t nanoseconds);

}  // namespace cistern
