#include "firmware_model/trigger/firing.hpp"

#include "traces/base/errors.hpp"

namespace cistern {

std::string_view name_of(FiringStatus status) {
  switch (status) {
    case FiringStatus::Passed: return "passed";
    case FiringStatus::Disabled: return "disabled";
    case FiringStatus::HeldOff: return "held_off";
    case FiringStatus::Prescaled: return "prescaled";
    case FiringStatus::Busy: return "busy";
  }
  report_bug("known firing status", __FILE__, __LINE__);
}

}  // namespace cistern
