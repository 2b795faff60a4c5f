#pragma once
/// \file
/// Runs numpy_reference.py in a process of its own and reads back what it found.
#include <cstdint>
#include <filesystem>
#include <string>
#include <vector>

#include "firmware_model/trigger/settings.hpp"
#include "traces/waveform/codes.hpp"

namespace cistern {

/// Traces of one shape and the trigger to run over them.
struct NumpyCase {
  TriggerSettings settings;
  std::vector<Codes> traces;
  bool contiguous{false};
};

/// One line of the firings table; texts as the script writes them.
struct NumpyFiring {
  std::int64_t trace{0};
  std::int64_t sample{0};
  std::int64_t onset_sample{0};
  std::string status;
  bool start_unknown{false};
  bool operator==(const NumpyFiring&) const = default;
};

struct NumpyMargin {
  std::int64_t trace{0};
  std::int64_t sample{0};
  std::int64_t margin{0};
  bool operator==(const NumpyMargin&) const = default;
};

struct NumpyAnswer {
  std::vector<NumpyFiring> firings;
  std::vector<NumpyMargin> margins;
};

/// One Python process for all cases; their files go to `folder`, which must exist.
/// Throws std::runtime_error when the script fails.
[[nodiscard]] std::vector<NumpyAnswer> ask_numpy(const std::vector<NumpyCase>& cases,
                                                 const std::filesystem::path& folder);

}  // namespace cistern
