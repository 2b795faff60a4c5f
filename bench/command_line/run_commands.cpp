#include <fmt/format.h>
#include <unistd.h>

#include <CLI/CLI.hpp>
#include <algorithm>
#include <chrono>
#include <csignal>
#include <memory>
#include <thread>

#include "bench/command_line/commands.hpp"
#include "bench/command_line/progress.hpp"
#include "bench/command_line/scenario_options.hpp"
#include "bench/command_line/timing.hpp"
#include "bench/experiments/run_options.hpp"
#include "bench/results/summary_text.hpp"

namespace cistern {
namespace {

volatile std::sig_atomic_t stop_requested = 0;

extern "C" void on_interrupt(int) {
  if (stop_requested != 0) ::_exit(static_cast<int>(ExitStatus::Stopped));
  stop_requested = 1;
}

using Experiment = RunOutcome (*)(const Scenario&, const RunOptions&);

struct RunArguments {
  std::shared_ptr<ScenarioArguments> scenario;
  std::string out;
  std::string traces;
  CLI::Option* seed_option{nullptr};
  std::uint64_t seed{0};
  int jobs{static_cast<int>(std::max(1U, std::thread::hardware_concurrency()))};
  bool quick{false};
  bool quiet{false};
  bool json{false};
};

RunOptions options_of(const RunArguments& arguments) {
  RunOptions options;
  if (!arguments.out.empty()) options.out = arguments.out;
  if (!arguments.traces.empty()) options.traces = arguments.traces;
  if (arguments.seed_option->count() > 0) options.seed = arguments.seed;
  options.jobs = arguments.jobs;
  options.effort = arguments.quick ? Effort::Quick : Effort::Full;
  options.stop = &stop_requested;
  return options;
}

bool all_met(const Summary& summary) {
  return std::all_of(summary.requirements.begin(), summary.requirements.end(),
                     [](const RequirementOutcome& outcome) { return outcome.verdict == "met"; });
}

void print_result(const RunOutcome& outcome, bool as_json) {
  if (as_json) {
    fmt::print("{}", summary_json(outcome.summary));
    return;
  }
  for (const std::string& line : outcome.lines) fmt::print("{}\n", line);
  fmt::print("report: {}\n", (outcome.directory / "report.html").string());
}

ExitStatus run(Experiment experiment, const RunArguments& arguments) {
  const Scenario scenario = load_scenario(*arguments.scenario);
  std::signal(SIGINT, on_interrupt);
  Progress progress(arguments.quiet ? ProgressStyle::Silent : style_of_standard_error());
  RunOptions options = options_of(arguments);
  options.advance = [&](std::string_view stage, std::int64_t done, std::int64_t total) {
    progress.advance(stage, done, total);
  };
  const Stopwatch stopwatch;
  const RunOutcome outcome = experiment(scenario, options);
  progress.finish();
  write_timing(outcome.directory, stopwatch, arguments.jobs, !outcome.interrupted);
  if (outcome.interrupted) {
    fmt::print(stderr, "cistern: stopped; {} holds what was finished{}\n", outcome.directory.string(),
               options.out ? ", the same call goes on from there" : "");
    return ExitStatus::Stopped;
  }
  print_result(outcome, arguments.json);
  return all_met(outcome.summary) ? ExitStatus::Met : ExitStatus::NotMet;
}

void add_run_command(CLI::App& app, std::function<ExitStatus()>& action, const std::string& name,
                     const std::string& description, Experiment experiment) {
  CLI::App* command = app.add_subcommand(name, description);
  const auto arguments = std::make_shared<RunArguments>();
  arguments->scenario = add_scenario_arguments(*command);
  command
      ->add_option("--out", arguments->out,
                   "Run directory: absent, empty, or an earlier run of the same; "
                   "cistern-run/" +
                       name + " if not given")
      ->type_name("DIR");
  arguments->seed_option =
      command->add_option("--seed", arguments->seed, "Campaign seed; [scenario] seed if not given")->type_name("N");
  command->add_option("--jobs", arguments->jobs, "Worker processes")
      ->type_name("N")
      ->check(CLI::Range(1, 256))
      ->capture_default_str();
  if (name != "rate") {
    command->add_option("--traces", arguments->traces, "Recorded traces: .csv, .npy, .h5 or .hdf5")->type_name("FILE");
  }
  if (name != "replay")
    command->add_flag("--quick", arguments->quick, "Fewer signals and less live time: wider limits, sooner");
  command->add_flag("--quiet", arguments->quiet, "No progress");
  command->add_flag("--json", arguments->json, "Print summary.json on standard output");
  command->callback([&action, experiment, arguments] { action = [=] { return run(experiment, *arguments); }; });
}

}  // namespace

void add_run_commands(CLI::App& app, std::function<ExitStatus()>& action) {
  add_run_command(app, action, "qualify", "Judge candidate triggers against those in service and the requirements",
                  run_qualify);
  add_run_command(app, action, "rate", "Background rate of each trigger against its level and its samples over",
                  run_rate);
  add_run_command(app, action, "replay", "Which triggers fire on recorded traces, where, and by what margin",
                  run_replay);
}

}  // namespace cistern
