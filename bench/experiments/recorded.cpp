#include "bench/experiments/recorded.hpp"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <cmath>
#include <utility>

#include "firmware_model/trigger/kernel.hpp"

namespace cistern {
namespace {

constexpr std::size_t samples_per_block = 16'384;

template <typename Number>
std::vector<Number> one_per_channel(const std::vector<Number>& values, std::size_t channels) {
  return values.size() == channels ? values : std::vector<Number>(channels, values.front());
}

/// The scenario's list, else the file's; a difference is noted.
template <typename Number>
std::optional<std::vector<Number>> scenario_first(const std::optional<std::vector<Number>>& scenario,
                                                  const std::optional<std::vector<Number>>& file, std::size_t channels,
                                                  const char* name, std::vector<std::string>& notes) {
  if (!scenario) return file;
  const auto wanted = one_per_channel(*scenario, channels);
  if (file && *file != wanted) {
    notes.push_back(fmt::format("{} of the scenario ({}) is used; the trace file says {}", name,
                                fmt::join(wanted, ", "), fmt::join(*file, ", ")));
  }
  return wanted;
}

void check_agreement(const Scenario& scenario, const TraceFileInfo& info, const std::string& file) {
  const DigitizerConfig& digitizer = scenario.digitizer;
  if (info.channels != static_cast<std::size_t>(digitizer.channels)) {
    throw InputError(file, fmt::format("has {} channels, expected the {} of [digitizer] channels", info.channels,
                                       digitizer.channels));
  }
  if (info.bits && *info.bits != digitizer.bits) {
    throw InputError(
        file, fmt::format("has codes of {} bits, expected the {} of [digitizer] bits", *info.bits, digitizer.bits));
  }
  if (info.sample_rate_mhz && std::abs(*info.sample_rate_mhz / digitizer.sample_rate_mhz - 1) > 1e-9) {
    throw InputError(file, fmt::format("was sampled at {} MHz, expected the {} MHz of [digitizer] sample_rate_mhz",
                                       *info.sample_rate_mhz, digitizer.sample_rate_mhz));
  }
}

/// Kernels and meters of all triggers over one trace after another.
class Scanner {
 public:
  Scanner(const std::vector<TriggerSettings>& triggers, const RecordedSink& sink) : sink_(sink) {
    for (const TriggerSettings& trigger : triggers) {
      kernels_.emplace_back(trigger);
      meters_.emplace_back(trigger.condition);
    }
  }

  void start_trace(bool keep_state) {
    if (!keep_state) {
      for (TriggerKernel& kernel : kernels_) kernel.reset();
      for (MarginMeter& meter : meters_) meter.reset();
    } else {
      for (MarginMeter& meter : meters_) meter.forget_best();
    }
    trace_start_ = kernels_.empty() ? 0 : kernels_.front().samples_seen();
  }

  void take(const TraceBlock& block) {
    in_block_.clear();
    for (std::size_t t = 0; t < kernels_.size(); ++t) {
      firings_.clear();
      kernels_[t].process(block.codes, firings_);
      meters_[t].process(block.codes);
      for (Firing firing : firings_) {
        firing.sample -= trace_start_;
        firing.onset_sample -= trace_start_;
        in_block_.emplace_back(t, firing);
      }
    }
    std::stable_sort(in_block_.begin(), in_block_.end(),
                     [](const auto& a, const auto& b) { return a.second.sample < b.second.sample; });
    for (const auto& [trigger, firing] : in_block_) sink_.firing(block.trace, block.start_ns, trigger, firing);
  }

  void end_trace(const TraceBlock& last) {
    RecordedTrace trace{
        last.trace, last.start_ns, last.first_sample + static_cast<std::int64_t>(last.codes.samples()), {}};
    for (const MarginMeter& meter : meters_) {
      auto best = meter.best();
      if (best) best->sample -= trace_start_;
      trace.margins.push_back(best);
    }
    sink_.end_of_trace(trace);
  }

 private:
  const RecordedSink& sink_;
  std::vector<TriggerKernel> kernels_;
  std::vector<MarginMeter> meters_;
  std::vector<Firing> firings_;
  std::vector<std::pair<std::size_t, Firing>> in_block_;
  std::int64_t trace_start_{0};
};

}  // namespace

RecordedFacts reconcile(const Scenario& scenario, const TraceFileInfo& info, const std::string& file) {
  check_agreement(scenario, info, file);
  RecordedFacts facts;
  const auto& own = scenario.digitizer.baseline_counts;
  const auto baselines = scenario_first(own.empty() ? std::nullopt : std::optional(own), info.baseline_counts,
                                        info.channels, "baseline_counts", facts.notes);
  if (!baselines) {
    throw InputError(file, "says no baseline_counts and neither does [digitizer]; expected it in one of them");
  }
  facts.station.baseline_counts = *baselines;
  facts.station.height_counts_per_vem =
      scenario_first(scenario.calibration.height_counts_per_vem, info.height_counts_per_vem, info.channels,
                     "height_counts_per_vem", facts.notes);
  facts.station.area_counts_per_vem = scenario_first(scenario.calibration.area_counts_per_vem, info.area_counts_per_vem,
                                                     info.channels, "area_counts_per_vem", facts.notes);
  facts.selection = info.selection.value_or(scenario.traces.selection.value_or(""));
  if (info.selection && scenario.traces.selection && *info.selection != *scenario.traces.selection) {
    facts.notes.push_back(fmt::format("the trace file's selection ({}) is used; [traces] selection says {}",
                                      *info.selection, *scenario.traces.selection));
  }
  facts.live_time_s = info.live_time_s ? info.live_time_s : scenario.traces.live_time_s;
  facts.contiguous = info.contiguous || scenario.traces.contiguous.value_or(false);
  return facts;
}

bool scan_recorded(TraceReader& reader, const std::vector<TriggerSettings>& triggers, bool contiguous,
                   const RecordedSink& sink) {
  Scanner scanner(triggers, sink);
  TraceBlock block;
  while (reader.next(samples_per_block, block)) {
    if (block.first_sample == 0) scanner.start_trace(contiguous && block.trace > 0);
    scanner.take(block);
    if (block.last_of_trace) scanner.end_trace(block);
    if (sink.stop()) return false;
  }
  return true;
}

}  // namespace cistern
