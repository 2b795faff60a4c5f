#include "bench/scenario/tables.hpp"

namespace cistern {
namespace {

std::string relative_to_scenario(const Scenario& scenario, const std::string& file) {
  return std::filesystem::path(file).is_absolute() ? file : (scenario.path.parent_path() / file).string();
}

}  // namespace

Table traces_table() {
  struct TracesKeys {
    RecordedTracesConfig config;
    std::string file;
  };
  using T = TracesKeys;
  const std::vector<Key<T>> keys{
      {"file", "", "none", "a path, relative to the scenario",
       "Recorded traces: .csv, .npy, .h5 or .hdf5; --traces wins over it.",
       [](T& t, const auto& node, const auto& at) { t.file = read_text(node, at, {}); }},
      {"selection", "", "none", "unbiased or triggered_by:NAME",
       "How the traces were selected, where their file does not say it.",
       [](T& t, const auto& node, const auto& at) {
         const std::string text = read_text(node, at, {});
         constexpr std::string_view prefix = "triggered_by:";
         if (text != "unbiased" && (text.rfind(prefix, 0) != 0 || text.size() == prefix.size()))
           reject(at, node, "\"unbiased\" or \"triggered_by:NAME\"");
         t.config.selection = text;
       }},
      {"live_time_s", "s", "none", "more than 0", "Live time of all traces together, where their file does not say it.",
       [](T& t, const auto& node, const auto& at) {
         t.config.live_time_s = read_number(node, at, {0, 1e12, true});
       }},
      {"contiguous", "", "false", "true or false", "Each trace goes on where the last ended.",
       [](T& t, const auto& node, const auto& at) { t.config.contiguous = read_switch(node, at); }},
      {"resample", "", "false", "false", "Traces of another sampling rate: not in this version.",
       [](T&, const auto& node, const auto& at) {
         if (read_switch(node, at))
           complain(at, "resampling is not in this version; expected traces at [digitizer] sample_rate_mhz");
       }}};
  Table table;
  table.name = "traces";
  table.sentence = "Recorded traces for `replay` and `qualify`.";
  table.keys = describe(keys);
  table.read = [keys](const ReadingContext& context, const toml::table& toml, const std::string& full_name,
                      Scenario& scenario) {
    T values;
    read_keys(context, keys, toml, full_name, values);
    scenario.traces = values.config;
    if (!values.file.empty()) scenario.traces.file = relative_to_scenario(scenario, values.file);
  };
  return table;
}

}  // namespace cistern
