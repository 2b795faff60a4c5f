/// \file
/// [[signal]], [qualify], [rate], [traces] and [requirements.NAME]: what is asked of the station.
#include <algorithm>

#include "bench/scenario/tables.hpp"

namespace cistern {
namespace {

std::string relative_to_scenario(const Scenario& scenario, const std::string& file) {
  return std::filesystem::path(file).is_absolute() ? file : (scenario.path.parent_path() / file).string();
}

void check_blocks(const KeyPlace& at, double block_s, double live_s, double quick_s) {
  const double shortest = std::min(live_s, quick_s);
  if (block_s > shortest) complain({at.place, at.key + ".block_s"}, fmt::format("got {}, expected at most the live times ({})", block_s, shortest));
}

std::vector<Key<SignalPlan>> signal_keys() {
  using S = SignalPlan;
  return {{"name", "", "required", "letters, digits, - and _", "In figure names; each once.", [](S& s, const auto& node, const auto& at) { s.name = read_name(node, at); }},
          {"kind", "", "required", "muon, electromagnetic or shower", "What the light comes from; see docs/physics.md.",
           [](S& s, const auto& node, const auto& at) {
             const std::string kind = read_text(node, at, {"muon", "electromagnetic", "shower"});
             s.kind = kind == "muon" ? SignalKind::Muon : kind == "shower" ? SignalKind::Shower : SignalKind::Electromagnetic;
           }},
          {"sizes_vem", "VEM", "required", "rising, more than 0 and at most 100000", "True sizes: mean photo-electrons over those of one VEM.",
           [](S& s, const auto& node, const auto& at) { s.sizes_vem = read_rising(node, at, {0, 1e5, true}); }},
          {"spreads_ns", "ns", "[0]", "rising, from 0 to 100000", "10 to 90 % of the arrival times; every size is made with every spread.",
           [](S& s, const auto& node, const auto& at) { s.spreads_ns = read_rising(node, at, {0, 1e5}); }}};
}

struct RequirementKeys {
  Requirement requirement;
  std::optional<double> at_most;
  std::optional<double> at_least;
};

bool is_figure_name(const std::string& text) {
  const bool good = std::all_of(text.begin(), text.end(), [](char c) { return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || (c >= '0' && c <= '9') || c == '_' || c == '-' || c == '.'; });
  return good && text.find('.') != std::string::npos && text.front() != '.' && text.back() != '.' && text.find("..") == std::string::npos;
}

std::vector<Key<RequirementKeys>> requirement_keys() {
  using R = RequirementKeys;
  return {{"figure", "", "required", "quantity.subject[.condition]", "The figure that is judged; summary.json lists all names.",
           [](R& r, const auto& node, const auto& at) {
             r.requirement.figure = read_text(node, at, {});
             if (!is_figure_name(r.requirement.figure)) reject(at, node, "a figure's name, such as background_rate.long");
           }},
          {"at_most", "of the figure", "none", "any number", "Upper bound; either this or at_least.", [](R& r, const auto& node, const auto& at) { r.at_most = read_number(node, at, {}); }},
          {"at_least", "of the figure", "none", "any number", "Lower bound.", [](R& r, const auto& node, const auto& at) { r.at_least = read_number(node, at, {}); }},
          {"confidence", "", "0.95", "more than 0.5 and at most 0.9999", "One-sided confidence of the verdict.",
           [](R& r, const auto& node, const auto& at) { r.requirement.confidence = read_number(node, at, {0.5, 0.9999, true}); }}};
}

}  // namespace

Table signal_table() {
  Table table;
  table.name = "signal";
  table.shape = TableShape::List;
  table.sentence = "Test signals that `qualify` places, one to a trace, over noise.";
  const auto keys = signal_keys();
  table.keys = describe(keys);
  table.read = [keys](const ReadingContext& context, const toml::table& toml, const std::string& full_name, Scenario& scenario) {
    SignalPlan plan;
    read_keys(context, keys, toml, full_name, plan);
    scenario.signals.push_back(std::move(plan));
  };
  return table;
}

Table qualify_table() {
  using Q = QualifyConfig;
  Table table = single_table<Q>(
      "qualify", "How much `qualify` measures.",
      {integer_key<Q>("signals_per_point", "", "2000", {1, 10'000'000}, "Test signals for each size and spread.", &Q::signals_per_point),
       integer_key<Q>("quick_signals_per_point", "", "300", {1, 10'000'000}, "The same with --quick.", &Q::quick_signals_per_point),
       number_key<Q>("live_time_s", "s", "120", {0.001, 1e7}, "Live time of background.", &Q::live_time_s),
       number_key<Q>("quick_live_time_s", "s", "12", {0.001, 1e7}, "The same with --quick.", &Q::quick_live_time_s),
       number_key<Q>("block_s", "s", "0.1", {0.0001, 1000}, "Firings are counted in blocks of this length.", &Q::block_s),
       number_key<Q>("match_window_ns", "ns", "4000", {1, 1e6}, "A first firing within it after the onset belongs to the signal.", &Q::match_window_ns),
       number_key<Q>("spare_before_ns", "ns", "3000", {0, 1e6}, "Noise before a test signal; at least the longest window is kept anyway.", &Q::spare_before_ns)},
      [](Scenario& scenario) -> Q& { return scenario.qualify; });
  table.check = [](const KeyPlace& at, Scenario& scenario) {
    check_blocks(at, scenario.qualify.block_s, scenario.qualify.live_time_s, scenario.qualify.quick_live_time_s);
  };
  return table;
}

Table rate_table() {
  using R = RateConfig;
  Table table = single_table<R>(
      "rate", "The scan of levels that `rate` (and the report of `qualify`) shows.",
      {number_key<R>("live_time_s", "s", "60", {0.001, 1e7}, "Live time of background.", &R::live_time_s),
       number_key<R>("quick_live_time_s", "s", "6", {0.001, 1e7}, "The same with --quick.", &R::quick_live_time_s),
       number_key<R>("block_s", "s", "0.1", {0.0001, 1000}, "Firings are counted in blocks of this length.", &R::block_s),
       {"level_factors", "", "[0.5, 0.6, ... 2.0]", "rising, more than 0 and at most 100", "Factors on each trigger's level or sum.",
        [](R& r, const auto& node, const auto& at) { r.level_factors = read_rising(node, at, {0, 100, true}); }},
       {"min_samples_over", "samples", "none", "whole, rising, from 1 to 65536", "Scan of the samples over of time_over_threshold triggers.",
        [](R& r, const auto& node, const auto& at) {
          r.min_samples_over.clear();
          for (const double value : read_rising(node, at, {1, 65536})) {
            if (value != static_cast<std::int32_t>(value)) reject(at, node, "whole numbers");
            r.min_samples_over.push_back(static_cast<std::int32_t>(value));
          }
        }},
       {"target_rate_hz", "Hz", "none", "more than 0", "`rate` tells at which level each trigger reaches it.",
        [](R& r, const auto& node, const auto& at) { r.target_rate_hz = read_number(node, at, {0, 1e9, true}); }}},
      [](Scenario& scenario) -> R& { return scenario.rate; });
  table.check = [](const KeyPlace& at, Scenario& scenario) {
    check_blocks(at, scenario.rate.block_s, scenario.rate.live_time_s, scenario.rate.quick_live_time_s);
  };
  return table;
}

Table traces_table() {
  struct TracesKeys {
    RecordedTracesConfig config;
    std::string file;
  };
  using T = TracesKeys;
  const std::vector<Key<T>> keys{
      {"file", "", "none", "a path, relative to the scenario", "Recorded traces: .csv, .npy, .h5 or .hdf5; --traces wins over it.", [](T& t, const auto& node, const auto& at) { t.file = read_text(node, at, {}); }},
      {"selection", "", "none", "unbiased or triggered_by:NAME", "How the traces were selected, where their file does not say it.",
       [](T& t, const auto& node, const auto& at) {
         const std::string text = read_text(node, at, {});
         constexpr std::string_view prefix = "triggered_by:";
         if (text != "unbiased" && (text.rfind(prefix, 0) != 0 || text.size() == prefix.size())) reject(at, node, "\"unbiased\" or \"triggered_by:NAME\"");
         t.config.selection = text;
       }},
      {"live_time_s", "s", "none", "more than 0", "Live time of all traces together, where their file does not say it.", [](T& t, const auto& node, const auto& at) { t.config.live_time_s = read_number(node, at, {0, 1e12, true}); }},
      {"contiguous", "", "false", "true or false", "Each trace goes on where the last ended.", [](T& t, const auto& node, const auto& at) { t.config.contiguous = read_switch(node, at); }},
      {"resample", "", "false", "false", "Traces of another sampling rate: not in this version.",
       [](T&, const auto& node, const auto& at) {
         if (read_switch(node, at)) complain(at, "resampling is not in this version; expected traces at [digitizer] sample_rate_mhz");
       }}};
  Table table;
  table.name = "traces";
  table.sentence = "Recorded traces for `replay` and `qualify`.";
  table.keys = describe(keys);
  table.read = [keys](const ReadingContext& context, const toml::table& toml, const std::string& full_name, Scenario& scenario) {
    T values;
    read_keys(context, keys, toml, full_name, values);
    scenario.traces = values.config;
    if (!values.file.empty()) scenario.traces.file = relative_to_scenario(scenario, values.file);
  };
  return table;
}

Table requirements_table() {
  Table table;
  table.name = "requirements";
  table.shape = TableShape::Named;
  table.sentence = "One written requirement, judged met, not met or undecided by one-sided limits.";
  const auto keys = requirement_keys();
  table.keys = describe(keys);
  table.read = [keys](const ReadingContext& context, const toml::table& toml, const std::string& full_name, Scenario& scenario) {
    RequirementKeys values;
    read_keys(context, keys, toml, full_name, values);
    const KeyPlace at = context.at(full_name, toml);
    if (values.at_most.has_value() == values.at_least.has_value()) {
      complain(at, fmt::format("needs one of at_most and at_least, got {}", values.at_most ? "both" : "neither"));
    }
    values.requirement.name = full_name.substr(full_name.find('.') + 1);
    values.requirement.place = at.place;
    values.requirement.kind = values.at_most ? BoundKind::AtMost : BoundKind::AtLeast;
    values.requirement.bound = values.at_most.value_or(values.at_least.value_or(0));
    scenario.requirements.push_back(values.requirement);
  };
  return table;
}

}  // namespace cistern
