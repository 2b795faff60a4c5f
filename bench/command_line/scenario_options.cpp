#include "bench/command_line/scenario_options.hpp"

#include <CLI/CLI.hpp>

namespace cistern {

std::shared_ptr<ScenarioArguments> add_scenario_arguments(CLI::App& command) {
  auto arguments = std::make_shared<ScenarioArguments>();
  command.add_option("SCENARIO", arguments->path, "The scenario file (TOML)")->required()->type_name("FILE");
  command
      .add_option("--set", arguments->settings,
                  "Override a scenario key: KEY=VALUE, for example trigger.long.majority=3")
      ->type_name("KEY=VALUE")
      ->take_all()
      ->expected(1)
      ->multi_option_policy(CLI::MultiOptionPolicy::TakeAll);
  return arguments;
}

Scenario load_scenario(const ScenarioArguments& arguments) {
  std::vector<Override> overrides;
  for (const std::string& setting : arguments.settings) {
    const auto equals = setting.find('=');
    if (equals == std::string::npos || equals == 0) {
      throw InputError("--set " + setting, "expected KEY=VALUE, for example trigger.long.majority=3");
    }
    overrides.push_back({setting.substr(0, equals), setting.substr(equals + 1)});
  }
  return load_scenario(arguments.path, overrides);
}

}  // namespace cistern
