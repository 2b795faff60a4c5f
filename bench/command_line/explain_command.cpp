#include <fmt/format.h>

#include <CLI/CLI.hpp>
#include <memory>

#include "bench/command_line/commands.hpp"
#include "bench/scenario/scenario.hpp"

namespace cistern {

void add_commands(CLI::App& app, std::function<ExitStatus()>& action) {
  add_run_commands(app, action);
  add_trace_commands(app, action);
  add_explain_command(app, action);
}

void add_explain_command(CLI::App& app, std::function<ExitStatus()>& action) {
  const auto key = std::make_shared<std::string>();
  CLI::App* command = app.add_subcommand("explain", "What a scenario key means: unit, default, range");
  command->add_option("KEY", *key, "A key (trigger.window_samples), a table (trigger), or nothing for all");
  command->callback([key, &action] {
    action = [key] {
      fmt::print("{}", explain_keys(*key));
      return ExitStatus::Met;
    };
  });
}

}  // namespace cistern
