#pragma once
/// \file
/// Runs a plain-port reference trigger in Icarus Verilog under the self-checking bench.
#include <cstdint>
#include <filesystem>
#include <vector>

#include "firmware_model/trigger/firing.hpp"
#include "firmware_model/trigger/settings.hpp"
#include "traces/waveform/codes.hpp"

namespace cistern {

struct IcarusTotals {
  std::int64_t clocks{0};
  std::int64_t firings{0};
  std::int64_t differences{0};  ///< clocks on which what fired was not what was expected
};

/// Compiles the trigger with these settings as its parameters and runs the whole trace.
/// \param folder  takes the files of the run; must exist
/// Throws std::runtime_error when Icarus fails or prints no totals.
[[nodiscard]] IcarusTotals run_in_icarus(const TriggerSettings& settings, const CodesView& codes,
                                         const std::vector<Firing>& expected, const std::filesystem::path& folder);

}  // namespace cistern
