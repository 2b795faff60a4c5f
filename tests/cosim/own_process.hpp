#pragma once
/// \file
/// The SystemC kernel starts once in a process, so whatever elaborates a model runs in a process of its own: under
/// ctest, and also when the whole test program is run by hand.
#include <functional>

namespace cistern {

/// Runs `body` in a child process. Its failed expectations, exceptions and crashes fail the calling test.
void in_own_process(const std::function<void()>& body);

}  // namespace cistern
