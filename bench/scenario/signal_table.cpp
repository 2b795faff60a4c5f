#include "bench/scenario/key_builders.hpp"
#include "bench/scenario/tables.hpp"

namespace cistern {
namespace {

std::vector<Key<SignalPlan>> signal_keys() {
  using S = SignalPlan;
  return {name_key<S>("In figure names; each once.", &S::name),
          choice_key<S, SignalKind>("kind", "required",
                                    {{"muon", SignalKind::Muon},
                                     {"electromagnetic", SignalKind::Electromagnetic},
                                     {"shower", SignalKind::Shower}},
                                    "What the light comes from; see docs/physics.md.", &S::kind),
          rising_key<S>("sizes_vem", "VEM", "required", {0, 1e5, true},
                        "True sizes: mean photo-electrons over those of one VEM.", &S::sizes_vem),
          rising_key<S>("spreads_ns", "ns", from_config, {0, 1e5},
                        "10 to 90 % of the arrival times; every size is made with every spread.", &S::spreads_ns)};
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
