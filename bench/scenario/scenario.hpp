#pragma once
/// \file
/// What a scenario file says, as plain values: checked key by key, not yet combined.
/// The file format is TOML; every key with unit, default and range: docs/scenario-reference.md.
#include <cstdint>
#include <filesystem>
#include <map>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "firmware_model/digitizer/digitizer.hpp"
#include "firmware_model/station/capture_book.hpp"
#include "firmware_model/trigger/settings.hpp"
#include "traces/generator/generator.hpp"

namespace cistern {

/// [scenario]
struct ScenarioIdentity {
  std::string title{"untitled"};
  std::string summary;
  std::uint64_t seed{1};
};

/// [site]: an altitude feeds the muon flux, the rest is for the report.
struct SiteConfig {
  std::string name;
  double latitude_deg{0};
  double altitude_m{880};
};

/// [calibration]: counts of one vertical equivalent muon; one entry or one per channel.
struct CalibrationConfig {
  std::optional<std::vector<double>> height_counts_per_vem;
  std::optional<std::vector<double>> area_counts_per_vem;
};

/// One [[trigger]] as written; becomes TriggerSettings when baselines and calibration are known.
/// Per-channel lists have one entry (for all) or one per channel.
struct TriggerPlan {
  std::string name;
  std::string place;  ///< "FILE:LINE" of the entry, for messages
  TriggerRole role{TriggerRole::Both};
  TriggerKind kind{TriggerKind::Threshold};
  std::optional<std::vector<std::int32_t>> level_counts;
  std::optional<std::vector<double>> level_vem;  ///< pulse height
  std::optional<std::int32_t> window_samples;
  std::optional<double> window_ns;
  std::optional<std::int32_t> min_samples_over;
  std::optional<double> min_ns_over;
  std::optional<std::int32_t> length_samples;
  std::optional<double> length_ns;
  std::optional<std::vector<std::int64_t>> sum_counts;
  std::optional<std::vector<double>> sum_vem;
  std::int32_t majority{1};
  std::vector<std::int32_t> channels;  ///< the mask; empty: all
  FiringSettings firing;
  std::map<std::string, std::string> places;  ///< of the keys that are written: "FILE:LINE" or "--set KEY"
};

/// One [[signal]]: test signals placed by `qualify`, every size with every spread.
struct SignalPlan {
  std::string name;  ///< subject in figure names
  SignalKind kind{SignalKind::Muon};
  std::vector<double> sizes_vem;
  std::vector<double> spreads_ns{0};
};

/// [qualify]
struct QualifyConfig {
  std::int32_t signals_per_point{2000};
  std::int32_t quick_signals_per_point{300};
  double live_time_s{120};
  double quick_live_time_s{12};
  double block_s{0.1};           ///< counting blocks of the background rate
  double match_window_ns{4000};  ///< onset to first firing
  double spare_before_ns{3000};  ///< quiet trace before a test signal
};

/// [rate]
struct RateConfig {
  double live_time_s{60};
  double quick_live_time_s{6};
  double block_s{0.1};
  std::vector<double> level_factors{0.5, 0.6, 0.7, 0.8, 0.9, 1.0, 1.1, 1.25, 1.4, 1.6, 2.0};  ///< on level or sum
  std::optional<double> target_rate_hz;        ///< `rate` tells where each trigger reaches it
  std::vector<std::int32_t> min_samples_over;  ///< scan of time-over-threshold triggers; may be empty
};

/// [traces]: recorded traces, and what their file does not say itself.
struct RecordedTracesConfig {
  std::optional<std::filesystem::path> file;
  std::optional<std::string> selection;  ///< never overrides `triggered_by`
  std::optional<double> live_time_s;
  std::optional<bool> contiguous;
};

enum class BoundKind { AtMost, AtLeast };

/// One [requirements.NAME]
struct Requirement {
  std::string name;
  std::string place;  ///< "FILE:LINE"
  std::string figure;
  BoundKind kind{BoundKind::AtMost};
  double bound{0};
  double confidence{0.95};  ///< one-sided
};

struct Scenario {
  std::filesystem::path path;
  ScenarioIdentity identity;
  SiteConfig site;
  DigitizerConfig digitizer;  ///< baseline_counts may be empty: then the trace file says
  CalibrationConfig calibration;
  std::vector<TriggerPlan> triggers;  ///< in file order
  bool has_tank{false};               ///< [tank] is there: synthetic traces can be made
  GeneratorConfig generator;
  bool has_station{false};  ///< [station] is there: firings can find it busy
  CaptureConfig capture;    ///< [station]
  std::vector<SignalPlan> signals;
  QualifyConfig qualify;
  RateConfig rate;
  RecordedTracesConfig traces;
  std::vector<Requirement> requirements;  ///< in file order
  std::string digest;                     ///< of the text and the overrides, hex: identifies a run
};

/// One --set KEY=VALUE: a dotted key (entries by name) and a TOML value.
struct Override {
  std::string key;
  std::string value;
};

/// Reads, overrides and checks everything, whatever the command. The first fault is an InputError
/// "FILE:LINE: KEY: what was expected", with the nearest known word where a word was not known.
[[nodiscard]] Scenario load_scenario(const std::filesystem::path& path, const std::vector<Override>& overrides);

/// What the digitizer and the calibration come to, one entry per channel.
struct StationFacts {
  std::vector<std::int32_t> baseline_counts;
  std::optional<std::vector<double>> height_counts_per_vem;
  std::optional<std::vector<double>> area_counts_per_vem;
};

/// Facts of the scenario alone. InputError if it has no baseline.
[[nodiscard]] StationFacts facts_of(const Scenario& scenario);

/// The triggers in counts and samples (VEM and ns rounded half up), in scenario order.
/// InputError where VEM values lack a calibration or a value leaves its range.
[[nodiscard]] std::vector<TriggerSettings> resolve_triggers(const Scenario& scenario, const StationFacts& facts);

/// The reference of one key, one table, or (empty) all tables, as text for a terminal.
/// InputError with the nearest known key.
[[nodiscard]] std::string explain_keys(std::string_view key);

/// The whole reference as Markdown: docs/scenario-reference.md.
[[nodiscard]] std::string scenario_reference();

}  // namespace cistern
