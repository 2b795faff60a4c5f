#include "bench/scenario/key_builders.hpp"
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
  const auto config = [](auto member) {
    return [member](T & t) -> auto& { return t.config.*member; };
  };
  const std::vector<Key<T>> keys{
      text_key<T>("file", "none",
                  "Recorded traces, a path relative to the scenario: .csv, .npy, .h5 or .hdf5; --traces wins over it.",
                  &T::file),
      {"selection", "", "none", "unbiased or triggered_by:NAME",
       "How the traces were selected, where their file does not say it.",
       [](T& t, const auto& node, const auto& at) {
         const std::string text = read_text(node, at, {});
         constexpr std::string_view prefix = "triggered_by:";
         if (text != "unbiased" && (text.rfind(prefix, 0) != 0 || text.size() == prefix.size()))
           reject(at, node, "\"unbiased\" or \"triggered_by:NAME\"");
         t.config.selection = text;
       }},
      number_key<T>("live_time_s", "s", "none", {0, 1e12, true},
                    "Live time of all traces together, where their file does not say it.",
                    config(&RecordedTracesConfig::live_time_s)),
      switch_key<T>("contiguous", "false", "Each trace goes on where the last ended, where their file does not say it.",
                    config(&RecordedTracesConfig::contiguous)),
      {"resample", "", "none", not_in_this_version, "Traces of another sampling rate.",
       [](T&, const auto&, const auto& at) {
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
