#pragma once
/// \file
/// The arguments that name a scenario and change it: SCENARIO and --set, the same for every command.
#include <memory>
#include <string>
#include <vector>

#include "bench/scenario/scenario.hpp"

namespace CLI {
class App;
}

namespace cistern {

struct ScenarioArguments {
  std::string path;
  std::vector<std::string> settings;  ///< KEY=VALUE
};

[[nodiscard]] std::shared_ptr<ScenarioArguments> add_scenario_arguments(CLI::App& command);
[[nodiscard]] Scenario load_scenario(const ScenarioArguments& arguments);

}  // namespace cistern
