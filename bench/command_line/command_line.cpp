#include "bench/command_line/command_line.hpp"

#include <fmt/format.h>

#include <CLI/CLI.hpp>
#include <algorithm>
#include <array>
#include <csignal>
#include <cstdio>
#include <functional>

#include "bench/command_line/commands.hpp"
#include "bench/experiments/run_options.hpp"
#include "traces/base/errors.hpp"
#include "traces/base/spelling.hpp"

namespace cistern {
namespace {

constexpr std::array<std::string_view, 7> commands_to_come{"power",   "array",   "tune",   "sweep",
                                                           "central", "station", "vectors"};

std::vector<std::string> option_names(const CLI::App& app) {
  std::vector<std::string> names;
  for (const CLI::Option* option : app.get_options()) {
    for (const std::string& name : option->get_lnames()) names.push_back("--" + name);
  }
  return names;
}

std::vector<std::string> command_names(const CLI::App& app) {
  std::vector<std::string> names;
  for (const CLI::App* command : app.get_subcommands(nullptr)) names.push_back(command->get_name());
  return names;
}

/// The command that the arguments chose, however deep.
const CLI::App& chosen_command(const CLI::App& app) {
  const auto chosen = app.get_subcommands();
  return chosen.empty() ? app : chosen_command(*chosen.front());
}

std::string full_name(const CLI::App& app, const CLI::App& root) {
  std::string name;
  for (const CLI::App* at = &app; at != &root; at = at->get_parent())
    name = at->get_name() + (name.empty() ? "" : " " + name);
  return name;
}

/// One line about a call that CLI11 refused, with the nearest thing it would have taken.
InputError call_error(const CLI::App& app, const CLI::ParseError& error, const std::vector<std::string>& arguments) {
  const CLI::App& command = chosen_command(app);
  const std::string place = "cistern " + full_name(command, app);
  const auto commands = command_names(command);
  for (const std::string& word : arguments) {
    const std::string bare = word.substr(0, word.find('='));
    const auto known = option_names(command);
    if (word.rfind("--", 0) == 0 && std::find(known.begin(), known.end(), bare) == known.end()) {
      return {place, fmt::format("unknown option {}; nearest: {}", bare, nearest_word(bare, known))};
    }
    if (word.rfind("-", 0) != 0 && !commands.empty() && word != command.get_name() &&
        std::find(commands.begin(), commands.end(), word) == commands.end()) {
      return {place, fmt::format("unknown command {}; nearest: {}", word, nearest_word(word, commands))};
    }
  }
  std::string text = error.what();
  std::replace(text.begin(), text.end(), '\n', ' ');
  return {place, text + (command.get_parent() == nullptr ? "; see `cistern --help`"
                                                         : fmt::format("; see `{} --help`", place))};
}

ExitStatus parse_and_run(const std::vector<std::string>& arguments) {
  if (!arguments.empty() &&
      std::find(commands_to_come.begin(), commands_to_come.end(), arguments.front()) != commands_to_come.end()) {
    throw InputError("cistern " + arguments.front(), "not in this version");
  }
  CLI::App app("Cistern qualifies trigger firmware of water-Cherenkov stations before it goes out.", "cistern");
  app.set_version_flag("--version", std::string(version()));
  app.require_subcommand(1);
  app.failure_message({});
  app.footer(
      "Exit status: 0 done, all requirements met; 1 a requirement not met or undecided; 2 the input or the call is\n"
      "wrong; 3 an internal or system fault; 130 stopped by Ctrl-C.");
  std::function<ExitStatus()> action;
  add_commands(app, action);
  try {
    std::vector<std::string> reversed(arguments.rbegin(), arguments.rend());
    app.parse(reversed);
  } catch (const CLI::CallForHelp& call) {
    const CLI::App& command = chosen_command(app);
    const std::string name = full_name(command, app);
    const auto own = name.rfind(' ');
    fmt::print("{}", command.help(name.empty()               ? ""
                                  : own == std::string::npos ? "cistern"
                                                             : "cistern " + name.substr(0, own)));
    return ExitStatus::Met;
  } catch (const CLI::CallForVersion&) {
    fmt::print("cistern {}\n", version());
    return ExitStatus::Met;
  } catch (const CLI::ParseError& error) {
    throw call_error(app, error, arguments);
  }
  return action();
}

}  // namespace

ExitStatus run_command_line(const std::vector<std::string>& arguments) {
  std::signal(SIGPIPE, SIG_IGN);
  std::signal(SIGXFSZ, SIG_IGN);  // a file size limit is then a full disk: a fault with its message
  try {
    return parse_and_run(arguments);
  } catch (const InputError& error) {
    fmt::print(stderr, "cistern: {}\n", error.what());
    return ExitStatus::WrongInput;
  } catch (const std::exception& error) {
    fmt::print(stderr, "cistern: fault: {}\n", error.what());
    return ExitStatus::Fault;
  }
}

}  // namespace cistern
