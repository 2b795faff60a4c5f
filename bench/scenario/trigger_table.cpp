#include <algorithm>

#include "bench/scenario/key_builders.hpp"
#include "bench/scenario/resolve.hpp"
#include "bench/scenario/tables.hpp"

namespace cistern {
namespace {

using P = TriggerPlan;

const std::vector<std::pair<std::string, TriggerKind>>& kinds() {
  static const std::vector<std::pair<std::string, TriggerKind>> all{
      {"threshold", TriggerKind::Threshold},
      {"time_over_threshold", TriggerKind::TimeOverThreshold},
      {"boxcar_sum", TriggerKind::BoxcarSum}};
  return all;
}

Key<P> kind_key() {
  Key<P> key = choice_key<P, TriggerKind>("kind", "required", kinds(), "The rule; see docs/triggers.md.", &P::kind);
  key.read = [plain = key.read, expected = key.range](P& plan, const toml::node& node, const KeyPlace& at) {
    const auto* kind = node.as_string();
    if (kind != nullptr && (kind->get() == "library" || kind->get() == "rtl")) {
      complain(at, fmt::format("kind \"{}\" is not in this version; expected {}", kind->get(), expected));
    }
    plain(plan, node, at);
  };
  return key;
}

/// Figures call the two sets of triggers in_service and candidate.
Key<P> name_of_trigger_key() {
  Key<P> key = name_key<P>("In figure names and with --set; each once, and not in_service or candidate.", &P::name);
  key.read = [plain = key.read](P& plan, const toml::node& node, const KeyPlace& at) {
    plain(plan, node, at);
    if (plan.name == "in_service" || plan.name == "candidate") {
      reject(at, node, "another name, since figures call a set of triggers so");
    }
  };
  return key;
}

/// A bare number could be meant as a number of channels, so only a list will do.
Key<P> mask_key() {
  Key<P> key =
      rising_integers_key<P>("channels", "", "all", {0, 15}, "The mask: channels that count, from 0.", &P::channels);
  key.range = "a list; " + key.range;
  key.read = [plain = key.read](P& plan, const toml::node& node, const KeyPlace& at) {
    if (!node.is_array()) reject(at, node, "a list of channels, such as [0, 1, 2]");
    plain(plan, node, at);
  };
  return key;
}

std::vector<Key<P>> trigger_keys() {
  constexpr auto level = static_cast<double>(largest_level_counts);
  constexpr auto sum = static_cast<double>(largest_sum_counts);
  const auto firing = [](auto member) {
    return [member](P & p) -> auto& { return p.firing.*member; };
  };
  return {
      name_of_trigger_key(),
      kind_key(),
      {"role", "", "both", "one of in_service, candidate",
       "Today's trigger, the one being qualified, or (without the key) part of both stations.",
       [](P& p, const auto& node, const auto& at) {
         p.role = read_text(node, at, {"in_service", "candidate"}) == "candidate" ? TriggerRole::Candidate
                                                                                  : TriggerRole::InService;
       }},
      channel_integers_key<P>("level_counts", "counts", "none", {-level, level},
                              "threshold, time_over_threshold: level above baseline, equal is over; or level_vem.",
                              &P::level_counts),
      channel_numbers_key<P>("level_vem", "VEM", "none", {-1e6, 1e6},
                             "The same in pulse heights of one VEM; needs height_counts_per_vem.", &P::level_vem),
      integer_key<P>("window_samples", "samples", "none", {1, 65536},
                     "time_over_threshold: the sliding window, this sample included; or window_ns.",
                     &P::window_samples),
      number_key<P>("window_ns", "ns", "none", {0, 1e9, true}, "The same in time.", &P::window_ns),
      integer_key<P>("min_samples_over", "samples", "none", {1, 65536},
                     "time_over_threshold: samples over that a channel needs, at most the window; or min_ns_over.",
                     &P::min_samples_over),
      number_key<P>("min_ns_over", "ns", "none", {0, 1e9, true}, "The same in time.", &P::min_ns_over),
      integer_key<P>("length_samples", "samples", "none", {1, 65536},
                     "boxcar_sum: length of the sliding sum; or length_ns.", &P::length_samples),
      number_key<P>("length_ns", "ns", "none", {0, 1e9, true}, "The same in time.", &P::length_ns),
      channel_integers_key<P>("sum_counts", "counts x samples", "none", {-sum, sum},
                              "boxcar_sum: the sum above baseline that a channel needs, equal is enough; or sum_vem.",
                              &P::sum_counts),
      channel_numbers_key<P>("sum_vem", "VEM", "none", {-1e6, 1e6},
                             "The same in pulse areas of one VEM; needs area_counts_per_vem.", &P::sum_vem),
      integer_key<P>("majority", "channels", from_config, {1, 16},
                     "Channels that must fulfil the condition together; at most those of the mask.", &P::majority),
      mask_key(),
      switch_key<P>("enabled", from_config, "A disabled trigger's firings are counted as disabled.",
                    firing(&FiringSettings::enabled)),
      integer_key<P>("hold_off_samples", "samples", from_config, {0, 1e9},
                     "Samples after a firing in which others are suppressed.",
                     firing(&FiringSettings::hold_off_samples)),
      choice_key<P, Rearm>("rearm", from_config, {{"edge", Rearm::Edge}, {"level", Rearm::Level}},
                           "Whether a condition still true after hold-off must be false first (edge) or fires at once "
                           "(level, which needs hold_off_samples of at least 1).",
                           firing(&FiringSettings::rearm)),
      integer_key<P>("prescale", "", from_config, {1, 1e9}, "Passes every n-th firing.",
                     firing(&FiringSettings::prescale))};
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

std::string words_of(const std::vector<EitherKey>& keys) {
  std::string words;
  for (const EitherKey& either : keys) {
    words += fmt::format("{}{} or {}", words.empty() ? "" : ", ", either.counts, either.physical);
  }
  return words;
}

void expect_one_of_each_pair(const TableView& at, TriggerKind kind) {
  for (const EitherKey& either : keys_of(kind)) {
    const bool has_counts = at.table->contains(either.counts);
    if (has_counts != at.table->contains(either.physical)) continue;
    complain({at.blame({either.counts, either.physical}).place, at.full_name},
             fmt::format("got {} of {} and {}, expected one of them for kind {}", has_counts ? "both" : "neither",
                         either.counts, either.physical, name_of(kind)));
  }
}

void refuse_keys_of_other_kinds(const TableView& at, TriggerKind kind) {
  const auto own = keys_of(kind);
  const auto refuse_foreign = [&](const EitherKey& either) {
    const auto is_same = [&](const EitherKey& mine) { return std::string_view(mine.counts) == either.counts; };
    if (std::any_of(own.begin(), own.end(), is_same)) return;
    for (const char* key : {either.counts, either.physical}) {
      if (!at.table->contains(key)) continue;
      complain({at.blame({key, "kind"}).place, at.full_name},
               fmt::format("{} is not a key of kind {}; its keys are {}", key, name_of(kind), words_of(own)));
    }
  };
  for (const TriggerKind other : {TriggerKind::TimeOverThreshold, TriggerKind::BoxcarSum}) {
    for (const EitherKey& either : keys_of(other)) refuse_foreign(either);
  }
}

void check_against_digitizer(const TableView& at, const P& plan, std::int32_t channels) {
  const auto check_list = [&](const char* key, const auto& values) {
    if (values) expect_per_channel(at.at(key), *values, channels);
  };
  check_list("level_counts", plan.level_counts);
  check_list("level_vem", plan.level_vem);
  check_list("sum_counts", plan.sum_counts);
  check_list("sum_vem", plan.sum_vem);
  if (!plan.channels.empty() && plan.channels.back() >= channels) {
    complain(at.at("channels"), fmt::format("got channel {}, expected 0 to {}, since [digitizer] channels is {}",
                                            plan.channels.back(), channels - 1, channels));
  }
  const auto usable = plan.channels.empty() ? channels : static_cast<std::int32_t>(plan.channels.size());
  if (plan.majority > usable) {
    complain(at.blame({"majority", "channels"}),
             fmt::format("got {}, expected at most {}, the number of channels that count", plan.majority, usable));
  }
}

void check_rearm(const TableView& at, const P& plan) {
  if (plan.firing.rearm == Rearm::Edge || plan.firing.hold_off_samples > 0) return;
  complain(at.blame({"rearm", "hold_off_samples"}),
           "got \"level\" with hold_off_samples = 0, expected hold_off_samples of at least 1 with it (samples)");
}

/// What can be computed now must come out in range now, whatever the command. A calibration that the
/// scenario lacks may still come with a trace file.
void check_resolved(const P& plan, const Scenario& scenario) {
  const CalibrationConfig& known = scenario.calibration;
  ConditionSettings condition;
  resolve_lengths(plan, scenario.digitizer.sample_rate_mhz, condition);
  if ((plan.level_vem && !known.height_counts_per_vem) || (plan.sum_vem && !known.area_counts_per_vem)) return;
  resolve_levels(plan, {{}, known.height_counts_per_vem, known.area_counts_per_vem}, scenario.digitizer.channels,
                 condition);
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
    const TableView at{context, &toml, full_name};
    plan.place = at.whole().place;
    for (const auto& [key, node] : toml) plan.places[std::string(key.str())] = at.at(std::string(key.str())).place;
    refuse_keys_of_other_kinds(at, plan.kind);
    expect_one_of_each_pair(at, plan.kind);
    check_against_digitizer(at, plan, scenario.digitizer.channels);
    check_rearm(at, plan);
    check_resolved(plan, scenario);
    scenario.triggers.push_back(std::move(plan));
  };
  return table;
}

}  // namespace cistern
