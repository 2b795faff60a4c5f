#pragma once
/// \file
/// The commands and their options, one function per group. Each sets `action` when it is chosen.
#include <functional>

#include "bench/command_line/command_line.hpp"

namespace CLI {
class App;
}

namespace cistern {

void add_commands(CLI::App& app, std::function<ExitStatus()>& action);
void add_run_commands(CLI::App& app, std::function<ExitStatus()>& action);    ///< qualify, rate, replay
void add_trace_commands(CLI::App& app, std::function<ExitStatus()>& action);  ///< traces make, convert...
void add_explain_command(CLI::App& app, std::function<ExitStatus()>& action);

}  // namespace cistern
