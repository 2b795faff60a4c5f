#include <algorithm>

#include "bench/scenario/tables.hpp"

namespace cistern {
namespace {

using P = TriggerPlan;

std::vector<std::int32_t> narrow(const std::vector<std::int64_t>& values) { return {values.begin(), values.end()}; }

std::vector<Key<P>> trigger_keys() {
  return {{"name", "", "required", "letters, digits, - and _", "In figure names and with --set; each once.",
           [](P& p, const auto& node, const auto& at) { p.name = read_name(node, at); }},
          {"kind", "", "required", "threshold, time_over_threshold or boxcar_sum", "The rule; see docs/triggers.md.",
           [](P& p, const auto& node, const auto& at) {
             const std::string kind =
                 read_text(node, at, {"threshold", "time_over_threshold", "boxcar_sum", "library", "rtl"});
             if (kind == "library" || kind == "rtl")
               complain(at, fmt::format("kind \"{}\" is not in this version; expected \"threshold\", "
                                        "\"time_over_threshold\" or \"boxcar_sum\"",
                                        kind));
             p.kind = kind == "threshold"    ? TriggerKind::Threshold
                      : kind == "boxcar_sum" ? TriggerKind::BoxcarSum
                                             : TriggerKind::TimeOverThreshold;
           }},
          {"role", "", "both", "in_service or candidate",
           "Today's trigger, the one being qualified, or (without the key) part of both stations.",
           [](P& p, const auto& node, const auto& at) {
             p.role = read_text(node, at, {"in_service", "candidate"}) == "candidate" ? TriggerRole::Candidate
                                                                                      : TriggerRole::InService;
           }},
          {"level_counts", "counts", "none", "whole; one, or one per channel",
           "Level above baseline; equal counts as over. Not for boxcar_sum.",
           [](P& p, const auto& node, const auto& at) {
             p.level_counts = narrow(read_integers(node, at, {-32768, 32768}));
           }},
          {"level_vem", "VEM", "none", "one, or one per channel",
           "The same in pulse heights of one VEM; needs height_counts_per_vem.",
           [](P& p, const auto& node, const auto& at) {
             p.level_vem = read_numbers(node, at, {-1e6, 1e6});
           }},
          {"window_samples", "samples", "none", "whole, from 1 to 65536",
           "time_over_threshold: the sliding window, this sample included.",
           [](P& p, const auto& node, const auto& at) {
             p.window_samples = static_cast<std::int32_t>(read_integer(node, at, {1, 65536}));
           }},
          {"window_ns", "ns", "none", "more than 0", "The same in time.",
           [](P& p, const auto& node, const auto& at) {
             p.window_ns = read_number(node, at, {0, 1e9, true});
           }},
          {"min_samples_over", "samples", "none", "whole, from 1 to window_samples",
           "time_over_threshold: samples over that a channel needs in the window.",
           [](P& p, const auto& node, const auto& at) {
             p.min_samples_over = static_cast<std::int32_t>(read_integer(node, at, {1, 65536}));
           }},
          {"min_ns_over", "ns", "none", "more than 0", "The same in time.",
           [](P& p, const auto& node, const auto& at) {
             p.min_ns_over = read_number(node, at, {0, 1e9, true});
           }},
          {"length_samples", "samples", "none", "whole, from 1 to 65536", "boxcar_sum: length of the sliding sum.",
           [](P& p, const auto& node, const auto& at) {
             p.length_samples = static_cast<std::int32_t>(read_integer(node, at, {1, 65536}));
           }},
          {"length_ns", "ns", "none", "more than 0", "The same in time.",
           [](P& p, const auto& node, const auto& at) {
             p.length_ns = read_number(node, at, {0, 1e9, true});
           }},
          {"sum_counts", "counts x samples", "none", "whole; one, or one per channel",
           "boxcar_sum: the sum above baseline that a channel needs; equal is enough.",
           [](P& p, const auto& node, const auto& at) {
             p.sum_counts = read_integers(node, at, {-4e9, 4e9});
           }},
          {"sum_vem", "VEM", "none", "one, or one per channel",
           "The same in pulse areas of one VEM; needs area_counts_per_vem.",
           [](P& p, const auto& node, const auto& at) {
             p.sum_vem = read_numbers(node, at, {-1e6, 1e6});
           }},
          integer_key<P>("majority", "channels", "1", {1, 16}, "Channels that must fulfil the condition together.",
                         &P::majority),
          {"channels", "", "all", "whole, from 0; each once", "The mask: channels that count.",
           [](P& p, const auto& node, const auto& at) {
             p.channels = narrow(read_integers(node, at, {0, 15}));
           }},
          {"enabled", "", "true", "true or false", "A disabled trigger's firings are counted as disabled.",
           [](P& p, const auto& node, const auto& at) { p.firing.enabled = read_switch(node, at); }},
          {"hold_off_samples", "samples", "0", "whole, from 0 to 1000000000",
           "Samples after a firing in which others are suppressed.",
           [](P& p, const auto& node, const auto& at) {
             p.firing.hold_off_samples = read_integer(node, at, {0, 1e9});
           }},
          {"rearm", "", "edge", "edge or level",
           "Whether a condition still true after hold-off must be false first (edge) or fires at once (level).",
           [](P& p, const auto& node, const auto& at) {
             p.firing.rearm = read_text(node, at, {"edge", "level"}) == "edge" ? Rearm::Edge : Rearm::Level;
           }},
          {"prescale", "", "1", "whole, from 1 to 1000000000", "Passes every n-th firing.",
           [](P& p, const auto& node, const auto& at) {
             p.firing.prescale = read_integer(node, at, {1, 1e9});
           }}};
}

/// A pair of keys of which a kind needs exactly one.
struct EitherKey {
  const char* counts;
  const char* physical;
};

std::vector<EitherKey> keys_of(TriggerKind kind) {
  switch (kind) {
    case TriggerKind::Threshold: return {{"level_counts", "level_vem"}};
    case TriggerKind::TimeOverThreshold:
      return {{"level_counts", "level_vem"}, {"window_samples", "window_ns"}, {"min_samples_over", "min_ns_over"}};
    case TriggerKind::BoxcarSum: return {{"length_samples", "length_ns"}, {"sum_counts", "sum_vem"}};
  }
  return {};
}

void check_keys_of_kind(const KeyPlace& at, const ReadingContext& context, const toml::table& toml, TriggerKind kind) {
  const auto own = keys_of(kind);
  for (const EitherKey& either : own) {
    const bool has_counts = toml.contains(either.counts);
    if (has_counts == toml.contains(either.physical)) {
      complain(at, fmt::format("kind {} needs one of {} and {}, got {}", name_of(kind), either.counts, either.physical,
                               has_counts ? "both" : "neither"));
    }
  }
  for (const TriggerKind other : {TriggerKind::TimeOverThreshold, TriggerKind::BoxcarSum}) {
    for (const EitherKey& either : keys_of(other)) {
      for (const char* name : {either.counts, either.physical}) {
        const bool is_own = std::any_of(
            own.begin(), own.end(), [&](const EitherKey& e) { return std::string_view(e.counts) == either.counts; });
        if (!is_own && toml.contains(name)) {
          complain(context.at(at.key + "." + name, *toml.get(name)),
                   fmt::format("is no key of kind {}; expected it only with {}", name_of(kind), name_of(other)));
        }
      }
    }
  }
}

template <typename Value>
void check_list(const KeyPlace& at, const char* key, const std::optional<std::vector<Value>>& values,
                std::int32_t channels) {
  if (values) expect_per_channel({at.place, at.key + "." + key}, *values, channels);
}

void check_against_digitizer(const KeyPlace& at, const P& plan, const Scenario& scenario) {
  const std::int32_t channels = scenario.digitizer.channels;
  check_list(at, "level_counts", plan.level_counts, channels);
  check_list(at, "level_vem", plan.level_vem, channels);
  check_list(at, "sum_counts", plan.sum_counts, channels);
  check_list(at, "sum_vem", plan.sum_vem, channels);
  std::vector<std::int32_t> mask = plan.channels;
  std::sort(mask.begin(), mask.end());
  if (std::adjacent_find(mask.begin(), mask.end()) != mask.end())
    complain({at.place, at.key + ".channels"}, "names a channel twice, expected each once");
  if (!mask.empty() && mask.back() >= channels) {
    complain({at.place, at.key + ".channels"},
             fmt::format("got {}, expected 0 to {}: there are {} channels", mask.back(), channels - 1, channels));
  }
  const auto usable = mask.empty() ? channels : static_cast<std::int32_t>(mask.size());
  if (plan.majority > usable) {
    complain({at.place, at.key + ".majority"},
             fmt::format("got {}, expected at most {}, the number of channels that count", plan.majority, usable));
  }
  if (plan.firing.rearm == Rearm::Level && plan.firing.hold_off_samples == 0) {
    complain({at.place, at.key + ".rearm"},
             "got \"level\" with hold_off_samples = 0, expected hold_off_samples of at least 1 with it");
  }
}

}  // namespace

Table trigger_table() {
  Table table;
  table.name = "trigger";
  table.shape = TableShape::List;
  table.sentence =
      "A trigger, in service or candidate. Values in VEM and ns become counts and samples by rounding half up.";
  const auto keys = trigger_keys();
  table.keys = describe(keys);
  table.read = [keys](const ReadingContext& context, const toml::table& toml, const std::string& full_name,
                      Scenario& scenario) {
    P plan;
    read_keys(context, keys, toml, full_name, plan);
    const KeyPlace at = context.at(full_name, toml);
    plan.place = at.place;
    check_keys_of_kind(at, context, toml, plan.kind);
    check_against_digitizer(at, plan, scenario);
    scenario.triggers.push_back(std::move(plan));
  };
  return table;
}

}  // namespace cistern
