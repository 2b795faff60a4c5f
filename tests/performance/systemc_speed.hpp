#pragma once
/// \file
/// How fast the SystemC kernel steps a trigger clock by clock: the reason why quiet stretches are not stepped.
#include <cstdint>

namespace cistern {

/// Million clocks per second of wall time: time over threshold, 4 channels, window 150, 21 over, majority 2, stepped on
/// an sc_clock while the codes stay at the baseline. May be called again: the same simulation goes on.
[[nodiscard]] double systemc_clocked_million_clocks_per_second(std::int64_t clocks);

}  // namespace cistern
