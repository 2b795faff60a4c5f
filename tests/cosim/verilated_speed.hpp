#pragma once
/// \file
/// How fast Verilated Verilog runs the time-over-threshold trigger: the yardstick of the benchmark.

namespace cistern {

/// Million clocks per second of wall time: the plain-port time_over_threshold.v with 4 channels,
/// window 150, 21 over, majority 2, on quiet traces; two evaluations a clock, as Verilator wants.
[[nodiscard]] double verilated_tot_million_clocks_per_second();

}  // namespace cistern
