#pragma once
/// \file
/// The rows of the run directory: what a run measured and what became of its requirements.
#include <optional>
#include <string>
#include <vector>

namespace cistern {

/// One measured quantity, named quantity.subject[.condition]; a decimal point inside a number is
/// written `p` (see figure_number).
struct Figure {
  std::string name;
  std::optional<double> value;  ///< absent: could not be given, `note` says why
  std::optional<double> low;    ///< two-sided 95 % limits
  std::optional<double> high;
  std::optional<double> systematic_low;
  std::optional<double> systematic_high;
  std::string unit;  ///< "" for a plain number
  std::string note;
};

/// 3 -> "3", 0.5 -> "0p5", 1.25 -> "1p25", -2 -> "minus_2".
[[nodiscard]] std::string figure_number(double value);

/// What became of one requirement.
struct RequirementOutcome {
  std::string name;
  std::string bound;  ///< "background_rate.long at most 40 Hz"
  std::optional<double> value;
  std::optional<double> low;  ///< one-sided limits at the requirement's confidence
  std::optional<double> high;
  std::string verdict;  ///< "met", "not met", "undecided"
  std::string reason;
};

/// One row of the `firings` table.
struct FiringRow {
  long long trace{0};
  std::string trigger;
  long long sample{0};
  std::optional<long long> time_ns;
  std::optional<long long> onset_sample;
  std::string status;
  bool start_unknown{false};
};

/// One row of the `margins` table.
struct MarginRow {
  long long trace{0};
  std::string trigger;
  long long sample{0};
  long long margin{0};
  std::string unit;
};

/// Everything that goes into summary.json.
struct Summary {
  std::string command;
  std::string scenario;  ///< file name
  std::string scenario_digest;
  std::string title;
  unsigned long long seed{0};
  std::string version;
  std::string verdict;  ///< "met", "not met", "undecided", "no requirements"
  std::vector<Figure> figures;
  std::vector<RequirementOutcome> requirements;
  std::vector<std::string> notes;  ///< warnings and limits of validity, one sentence each
};

}  // namespace cistern
