#include <fmt/format.h>

#include <string>

#include "bench/experiments/run_record.hpp"
#include "bench/experiments/trace_tools.hpp"
#include "traces/base/time.hpp"

namespace cistern {
namespace {

TraceFileInfo info_of(const Scenario& scenario, const StationPlan& plan, const MakeRequest& request) {
  TraceFileInfo info;
  info.channels = static_cast<std::size_t>(plan.digitizer.channels);
  info.samples = static_cast<std::size_t>(request.samples);
  info.traces = request.traces;
  info.sample_rate_mhz = plan.digitizer.sample_rate_mhz;
  info.bits = plan.digitizer.bits;
  info.baseline_counts = plan.digitizer.baseline_counts;
  info.height_counts_per_vem = facts_of(scenario).height_counts_per_vem;
  info.area_counts_per_vem = facts_of(scenario).area_counts_per_vem;
  info.selection = "unbiased";
  if (!request.signal) {
    info.contiguous = true;
    info.live_time_s = static_cast<double>(request.traces) * static_cast<double>(request.samples) /
                       (plan.digitizer.sample_rate_mhz * 1e6);
  }
  return info;
}

void check(const MakeRequest& request) {
  if (request.traces < 1) throw InputError("--traces", fmt::format("got {}, expected at least 1", request.traces));
  if (request.samples < 16 || request.samples > 100'000'000) {
    throw InputError("--samples", fmt::format("got {}, expected 16 to 100,000,000", request.samples));
  }
  if (request.signal && !(request.size_vem > 0 && request.size_vem <= 1e6)) {
    throw InputError("--size-vem", fmt::format("got {}, expected more than 0 and at most 1e6", request.size_vem));
  }
  if (request.signal && !(request.spread_ns >= 0 && request.spread_ns <= 1e6)) {
    throw InputError("--spread-ns", fmt::format("got {}, expected 0 to 1e6", request.spread_ns));
  }
  if (request.onset_sample && (*request.onset_sample < 0 || *request.onset_sample >= request.samples)) {
    throw InputError("--onset-sample",
                     fmt::format("got {}, expected 0 to {}", *request.onset_sample, request.samples - 1));
  }
  if (request.start_ns && format_of(request.out) != TraceFormat::Hdf5) {
    throw InputError("--start-ns", "only an HDF5 file can hold the start of its traces; expected --out NAME.h5");
  }
}

std::vector<TruthColumn> truth_of(const MakeRequest& request, std::int64_t onset) {
  if (!request.signal || format_of(request.out) != TraceFormat::Hdf5) return {};
  const auto traces = static_cast<std::size_t>(request.traces);
  return {{"size_vem", "VEM", std::vector<double>(traces, request.size_vem)},
          {"spread_ns", "ns", std::vector<double>(traces, request.spread_ns)},
          {"onset_sample", "samples", std::vector<double>(traces, static_cast<double>(onset))}};
}

}  // namespace

void make_traces(const Scenario& scenario, const MakeRequest& request, const TraceProgress& progress) {
  check(request);
  require_tank("traces make", scenario);
  const StationPlan plan = plan_station(scenario, facts_of(scenario));
  const TraceGenerator generator(scenario.generator, request.seed);
  const auto writer = create_trace_file(request.out, info_of(scenario, plan, request));
  const std::int64_t onset = request.onset_sample.value_or(request.samples / 4);
  const auto samples = static_cast<std::size_t>(request.samples);
  Waveform waveform;
  Codes codes;
  for (std::int64_t trace = 0; trace < request.traces; ++trace) {
    if (request.signal) {
      generator.make_signal({*request.signal, request.size_vem, request.spread_ns}, static_cast<std::uint64_t>(trace),
                            samples, onset, waveform);
    } else {
      generator.make_background(0, trace * request.samples, samples, waveform);
    }
    digitize(plan.digitizer, waveform, codes);
    TraceBlock block{trace, 0, true, {}, codes.view()};
    if (request.start_ns) {
      block.start_ns = *request.start_ns + sample_offset_ns(trace * request.samples, plan.digitizer.sample_rate_mhz);
    }
    writer->append(block);
    progress(trace + 1, request.traces);
  }
  writer->finish(truth_of(request, onset));
}

std::vector<std::string> calibration_lines(const Scenario& scenario, int muons, std::uint64_t seed) {
  require_tank("traces calibrate", scenario);
  const TraceGenerator generator(scenario.generator, seed);
  const VemCalibration vem = calibrate(generator, static_cast<std::size_t>(scenario.digitizer.channels), muons);
  const auto list = [](const std::vector<double>& values, int digits) {
    std::string text;
    for (const double value : values) text += fmt::format("{}{:.{}f}", text.empty() ? "" : ", ", value, digits);
    return "[" + text + "]";
  };
  return {fmt::format("# {} simulated vertical muons through the centre of the tank, without noise", muons),
          fmt::format("# standard errors: height {} counts, area {} counts x samples", list(vem.height_error, 2),
                      list(vem.area_error, 1)),
          "[calibration]", "height_counts_per_vem = " + list(vem.height_counts, 1),
          "area_counts_per_vem = " + list(vem.area_counts, 0)};
}

}  // namespace cistern
