#include <fmt/format.h>

#include <CLI/CLI.hpp>
#include <memory>

#include "bench/command_line/commands.hpp"
#include "bench/command_line/progress.hpp"
#include "bench/command_line/scenario_options.hpp"
#include "bench/experiments/trace_tools.hpp"
#include "traces/base/spelling.hpp"

namespace cistern {
namespace {

TraceProgress draw_on(const std::shared_ptr<Progress>& progress) {
  return [progress](std::int64_t done, std::int64_t total) { progress->advance("traces", done, total); };
}

TraceProgress standard_progress() { return draw_on(std::make_shared<Progress>(style_of_standard_error())); }

std::optional<SignalKind> signal_named(const std::string& word) {
  if (word == "background") return {};
  std::vector<std::string> known{"background"};
  for (const SignalKind kind : {SignalKind::Muon, SignalKind::Electromagnetic, SignalKind::Shower}) {
    if (word == name_of(kind)) return kind;
    known.emplace_back(name_of(kind));
  }
  throw InputError("--kind " + word, fmt::format("expected background, muon, electromagnetic or shower; nearest: {}",
                                                 nearest_word(word, known)));
}

void add_make(CLI::App& traces, std::function<ExitStatus()>& action) {
  struct Arguments {
    std::shared_ptr<ScenarioArguments> scenario;
    MakeRequest request;
    std::string kind{"background"};
    std::int64_t onset{0};
    std::int64_t start_ns{0};
    CLI::Option* onset_option{nullptr};
    CLI::Option* start_option{nullptr};
    CLI::Option* seed_option{nullptr};
  };
  CLI::App* command = traces.add_subcommand("make", "Write synthetic traces of a scenario's station");
  const auto a = std::make_shared<Arguments>();
  a->scenario = add_scenario_arguments(*command);
  command->add_option("--out", a->request.out, "File to write: .csv, .npy, .h5 or .hdf5")
      ->type_name("FILE")
      ->required();
  command->add_option("--kind", a->kind, "background (stretches one after the other), muon, electromagnetic or shower")
      ->type_name("KIND")
      ->capture_default_str();
  command->add_option("--size-vem", a->request.size_vem, "True size of a signal, VEM")
      ->type_name("VEM")
      ->capture_default_str();
  command->add_option("--spread-ns", a->request.spread_ns, "10 to 90 % of a signal's arrival times, ns")
      ->type_name("NS")
      ->capture_default_str();
  command->add_option("--traces", a->request.traces, "Number of traces")->type_name("N")->capture_default_str();
  command->add_option("--samples", a->request.samples, "Samples in each trace")->type_name("N")->capture_default_str();
  a->onset_option =
      command->add_option("--onset-sample", a->onset, "Where a signal starts; a quarter of the trace if not given")
          ->type_name("N");
  a->start_option =
      command->add_option("--start-ns", a->start_ns, "Start of the first trace, ns since the GPS epoch (HDF5 only)")
          ->type_name("NS");
  a->seed_option = command->add_option("--seed", a->request.seed, "Seed; [scenario] seed if not given")->type_name("N");
  command->callback([a, &action] {
    action = [a] {
      const Scenario scenario = load_scenario(*a->scenario);
      a->request.signal = signal_named(a->kind);
      if (a->onset_option->count() > 0) a->request.onset_sample = a->onset;
      if (a->start_option->count() > 0) a->request.start_ns = a->start_ns;
      if (a->seed_option->count() == 0) a->request.seed = scenario.identity.seed;
      make_traces(scenario, a->request, standard_progress());
      fmt::print("{}: {} traces of {} samples\n", a->request.out.string(), a->request.traces, a->request.samples);
      return ExitStatus::Met;
    };
  });
}

void add_convert(CLI::App& traces, std::function<ExitStatus()>& action) {
  struct Arguments {
    ConvertRequest request;
    double sample_rate_mhz{0};
    double live_time_s{0};
    std::int32_t bits{0};
    std::vector<std::int32_t> baseline;
    std::string selection;
  };
  CLI::App* command = traces.add_subcommand("convert", "Convert between CSV, NPY and HDF5 (by the names' endings)");
  const auto a = std::make_shared<Arguments>();
  command->add_option("IN", a->request.in, "File to read")->type_name("FILE")->required();
  command->add_option("OUT", a->request.out, "File to write")->type_name("FILE")->required();
  command->add_option("--sample-rate-mhz", a->sample_rate_mhz, "Where IN does not say it")
      ->type_name("MHZ")
      ->check(CLI::PositiveNumber);
  command->add_option("--bits", a->bits, "Where IN does not say it")->type_name("N")->check(CLI::Range(4, 15));
  command->add_option("--baseline-counts", a->baseline, "Where IN does not say it: one number, or one per channel")
      ->type_name("LIST")
      ->delimiter(',');
  command->add_option("--selection", a->selection, "unbiased or triggered_by:NAME, where IN does not say it")
      ->type_name("WORD");
  command->add_option("--live-time-s", a->live_time_s, "Where IN does not say it")
      ->type_name("S")
      ->check(CLI::PositiveNumber);
  command->add_flag("--contiguous", a->request.said.contiguous, "Each trace goes on where the last ended");
  command->callback([a, &action] {
    action = [a] {
      TraceFileInfo& said = a->request.said;
      if (a->sample_rate_mhz > 0) said.sample_rate_mhz = a->sample_rate_mhz;
      if (a->bits > 0) said.bits = a->bits;
      if (!a->baseline.empty()) said.baseline_counts = a->baseline;
      if (!a->selection.empty()) said.selection = a->selection;
      if (a->live_time_s > 0) said.live_time_s = a->live_time_s;
      convert_traces(a->request, standard_progress());
      fmt::print("{}: written\n", a->request.out.string());
      return ExitStatus::Met;
    };
  });
}

void add_describe(CLI::App& traces, std::function<ExitStatus()>& action) {
  CLI::App* command =
      traces.add_subcommand("describe", "What is in a trace file: shape, baselines, noise, saturation, spectrum");
  const auto file = std::make_shared<std::string>();
  const auto json = std::make_shared<bool>(false);
  command->add_option("FILE", *file, "File to read")->type_name("FILE")->required();
  command->add_flag("--json", *json, "As JSON");
  command->callback([file, json, &action] {
    action = [file, json] {
      if (*json) {
        fmt::print("{}", describe_traces_json(*file, standard_progress()));
      } else {
        for (const std::string& line : describe_traces(*file, standard_progress())) fmt::print("{}\n", line);
      }
      return ExitStatus::Met;
    };
  });
}

void add_calibrate(CLI::App& traces, std::function<ExitStatus()>& action) {
  CLI::App* command =
      traces.add_subcommand("calibrate", "Counts per VEM of a scenario's station, from simulated vertical muons");
  const auto scenario = add_scenario_arguments(*command);
  const auto muons = std::make_shared<int>(4000);
  const auto seed = std::make_shared<std::uint64_t>(1);
  command->add_option("--muons", *muons, "Number of muons")
      ->type_name("N")
      ->check(CLI::Range(10, 10'000'000))
      ->capture_default_str();
  command->add_option("--seed", *seed, "Seed")->type_name("N")->capture_default_str();
  command->callback([=, &action] {
    action = [=] {
      for (const std::string& line : calibration_lines(load_scenario(*scenario), *muons, *seed))
        fmt::print("{}\n", line);
      return ExitStatus::Met;
    };
  });
}

}  // namespace

void add_trace_commands(CLI::App& app, std::function<ExitStatus()>& action) {
  CLI::App* traces = app.add_subcommand("traces", "Make, convert and describe trace files; calibrate a station");
  traces->require_subcommand(1);
  add_make(*traces, action);
  add_convert(*traces, action);
  add_describe(*traces, action);
  add_calibrate(*traces, action);
}

}  // namespace cistern
