#include "firmware_model/trigger/trigger_module.hpp"

#include <optional>
#include <ostream>

namespace cistern {

std::ostream& operator<<(std::ostream& out, const FiringReport& report) {
  if (!report.present) return out << "none";
  return out << name_of(report.firing.status) << " at " << report.firing.sample;
}

void sc_trace(sc_core::sc_trace_file* file, const FiringReport& report, const std::string& name) {
  sc_core::sc_trace(file, report.present, name);
}

TriggerModule::TriggerModule(sc_core::sc_module_name name, const TriggerSettings& settings)
    : sc_core::sc_module(name),
      codes("codes", settings.condition.baseline_counts.size()),
      specification_(settings),
      sample_(settings.condition.baseline_counts.size()) {
  SC_HAS_PROCESS(TriggerModule);
  SC_METHOD(on_clock);
  sensitive << clock.pos();
  dont_initialize();
}

void TriggerModule::on_clock() {
  std::optional<Firing> firing;
  if (reset.read()) {
    specification_.reset();
  } else {
    for (std::size_t c = 0; c < sample_.size(); ++c) sample_[c] = codes[c].read();
    firing = specification_.step(sample_);
  }
  fire.write(firing && firing->status == FiringStatus::Passed);
  report.write({firing.has_value(), firing.value_or(Firing{})});
}

}  // namespace cistern
