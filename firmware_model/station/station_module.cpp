#include "firmware_model/station/station_module.hpp"

#include <algorithm>
#include <string>

#include "traces/base/errors.hpp"
#include "traces/base/time.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t ticks_per_ns = 1000;  // at the kernel's resolution of 1 ps

sc_core::sc_time half(const sc_core::sc_time& duration) { return sc_core::sc_time::from_value(duration.value() / 2); }

std::string code_out_of_range(std::int16_t code, std::int16_t largest) {
  return "code 0 to " + std::to_string(largest) + " expected, found " + std::to_string(code);
}

}  // namespace

sc_core::sc_time exact_time_ns(std::int64_t nanoseconds) {
  CISTERN_ASSERT(nanoseconds >= 0);
  return sc_core::sc_time::from_value(static_cast<std::uint64_t>(nanoseconds) * ticks_per_ns);
}

SamplingClock::SamplingClock(sc_core::sc_module_name name, double sample_rate_mhz)
    : sc_core::sc_module(name), sample_rate_mhz_(sample_rate_mhz) {
  SC_HAS_PROCESS(SamplingClock);
  SC_METHOD(toggle);
}

void SamplingClock::toggle() {
  high_ = !high_;
  clock.write(high_);
  if (high_) ++edge_;
  const sc_core::sc_time rest = exact_time_ns(sample_offset_ns(edge_, sample_rate_mhz_)) - sc_core::sc_time_stamp();
  next_trigger(high_ ? half(rest) : rest);
}

DigitizerModule::DigitizerModule(sc_core::sc_module_name name, const DigitizerConfig& config, CodesView view)
    : sc_core::sc_module(name),
      codes("codes", view.channels()),
      view_(view),
      largest_code_(static_cast<std::int16_t>(largest_code(config))),
      next_(-config.latency_samples) {
  SC_HAS_PROCESS(DigitizerModule);
  SC_METHOD(on_clock);
  sensitive << clock.pos();
  dont_initialize();
}

/// An exception must not cross the kernel: it is kept for the caller of the simulation.
void DigitizerModule::on_clock() {
  try {
    const bool has_sample = next_ >= 0 && next_ < static_cast<std::int64_t>(view_.samples());
    if (has_sample) put(static_cast<std::size_t>(next_));
    valid.write(has_sample);
    reset.write(next_ < 0);
    ++next_;
  } catch (...) {
    failure_ = std::current_exception();
    sc_core::sc_stop();
  }
}

void DigitizerModule::put(std::size_t sample) {
  for (std::size_t c = 0; c < codes.size(); ++c) {
    const std::int16_t code = view_.channel(c)[sample];
    if (code < 0 || code > largest_code_) {
      throw InputError("sample " + std::to_string(sample) + " of channel " + std::to_string(c),
                       code_out_of_range(code, largest_code_));
    }
    codes[c].write(code);
  }
}

CaptureModule::CaptureModule(sc_core::sc_module_name name, const StationConfig& config, std::size_t triggers)
    : sc_core::sc_module(name),
      codes("codes", static_cast<std::size_t>(config.digitizer.channels)),
      reports("reports", triggers),
      config_(config),
      unit_(config.capture, codes.size(), config.ring_samples),
      sample_(codes.size()) {
  SC_HAS_PROCESS(CaptureModule);
  SC_METHOD(on_clock);
  sensitive << clock.pos();
  dont_initialize();
}

void CaptureModule::on_clock() {
  take_reports();
  if (valid.read()) {
    for (std::size_t c = 0; c < sample_.size(); ++c) sample_[c] = codes[c].read();
    unit_.store(sample_);
    ++stored_;
  }
  busy.write(unit_.is_busy());
}

void CaptureModule::take_reports() {
  for (std::size_t t = 0; t < reports.size(); ++t) {
    const FiringReport& report = reports[t].read();
    if (!report.present) continue;
    CISTERN_ASSERT(report.firing.sample == stored_ - 1);
    StationFiring& firing = firings_.emplace_back(firing_of(t, report.firing));
    if (report.firing.status != FiringStatus::Passed) continue;
    const CaptureDecision decision = unit_.fire();
    firing.outcome = decision.outcome;
    firing.capture = decision.capture;
    if (decision.outcome == CaptureOutcome::NoFreeBuffer) firing.firing.status = FiringStatus::Busy;
  }
}

StationFiring CaptureModule::firing_of(std::size_t trigger, const Firing& firing) const {
  StationFiring result;
  result.trigger = trigger;
  result.firing = firing;
  result.time_ns = config_.start_ns + sample_offset_ns(firing.sample, config_.digitizer.sample_rate_mhz);
  result.decided_ns = config_.start_ns + static_cast<std::int64_t>(sc_core::sc_time_stamp().value() / ticks_per_ns);
  return result;
}

StationRun CaptureModule::finish() {
  StationRun run;
  run.firings = firings_;
  run.captures = unit_.finish();
  run.samples = stored_;
  run.busy_samples = unit_.busy_samples();
  return run;
}

StationModule::StationModule(sc_core::sc_module_name name, const StationConfig& config,
                             const std::vector<TriggerSettings>& triggers, CodesView view)
    : sc_core::sc_module(name),
      codes_("codes_wire", view.channels()),
      fires_("fire_wire", triggers.size()),
      reports_("report_wire", triggers.size()),
      sampling_clock_("sampling_clock", config.digitizer.sample_rate_mhz),
      digitizer_("digitizer", config.digitizer, view),
      capture_("capture", config, triggers.size()) {
  sampling_clock_.clock(clock_);
  digitizer_.clock(clock_);
  digitizer_.codes(codes_);
  digitizer_.valid(valid_);
  digitizer_.reset(reset_);
  wire_triggers(triggers);
  capture_.clock(clock_);
  capture_.codes(codes_);
  capture_.valid(valid_);
  if (!triggers.empty()) capture_.reports(reports_);  // the kernel warns of empty vectors
  capture_.busy(busy_);
}

void StationModule::wire_triggers(const std::vector<TriggerSettings>& triggers) {
  for (std::size_t t = 0; t < triggers.size(); ++t) {
    const std::string name = "trigger_" + std::to_string(t);
    TriggerModule& trigger = *triggers_.emplace_back(std::make_unique<TriggerModule>(name.c_str(), triggers[t]));
    trigger.clock(clock_);
    trigger.reset(reset_);
    trigger.codes(codes_);
    trigger.fire(fires_[t]);
    trigger.report(reports_[t]);
  }
}

}  // namespace cistern
