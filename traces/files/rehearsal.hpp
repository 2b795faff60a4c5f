#pragma once
/// \file
/// Work that may bring the process down is tried in another one first. HDF5 1.10 crashes, or never ends,
/// on some damaged files instead of reporting them. Internal to traces/files.
#include <functional>

namespace cistern {

/// Whether the work comes to an end in a copy of this process; by an exception is an end too. What it
/// does to memory is lost with the copy. SystemFault when there can be no copy.
[[nodiscard]] bool comes_to_an_end(const std::function<void()>& work);

}  // namespace cistern
