#include "bench/scenario/tables.hpp"

namespace cistern {
namespace {

std::vector<Key<SignalPlan>> signal_keys() {
  using S = SignalPlan;
  return {{"name", "", "required", "letters, digits, - and _", "In figure names; each once.",
           [](S& s, const auto& node, const auto& at) { s.name = read_name(node, at); }},
          {"kind", "", "required", "muon, electromagnetic or shower", "What the light comes from; see docs/physics.md.",
           [](S& s, const auto& node, const auto& at) {
             const std::string kind = read_text(node, at, {"muon", "electromagnetic", "shower"});
             s.kind = kind == "muon"     ? SignalKind::Muon
                      : kind == "shower" ? SignalKind::Shower
                                         : SignalKind::Electromagnetic;
           }},
          {"sizes_vem", "VEM", "required", "rising, more than 0 and at most 100000",
           "True sizes: mean photo-electrons over those of one VEM.",
           [](S& s, const auto& node, const auto& at) {
             s.sizes_vem = read_rising(node, at, {0, 1e5, true});
           }},
          {"spreads_ns", "ns", "[0]", "rising, from 0 to 100000",
           "10 to 90 % of the arrival times; every size is made with every spread.",
           [](S& s, const auto& node, const auto& at) {
             s.spreads_ns = read_rising(node, at, {0, 1e5});
           }}};
}

}  // namespace

Table signal_table() {
  Table table;
  table.name = "signal";
  table.shape = TableShape::List;
  table.sentence = "Test signals that `qualify` places, one to a trace, over noise.";
  const auto keys = signal_keys();
  table.keys = describe(keys);
  table.read = [keys](const ReadingContext& context, const toml::table& toml, const std::string& full_name,
                      Scenario& scenario) {
    SignalPlan plan;
    read_keys(context, keys, toml, full_name, plan);
    scenario.signals.push_back(std::move(plan));
  };
  return table;
}

}  // namespace cistern
