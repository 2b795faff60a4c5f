#pragma once
/// \file
/// The directory that one run leaves behind: summary.json, run.sqlite, CSV files, junit.xml,
/// report.html and timing.json. What it may replace and what it resumes: docs/run-directory.md.
#include <cstdint>
#include <filesystem>
#include <memory>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "bench/results/figure.hpp"

namespace cistern {

/// What makes two runs the same run.
struct RunIdentity {
  std::string command;
  std::string scenario;  ///< digest of the scenario text and its overrides
  std::uint64_t seed{0};
  std::string version;
  std::string options;  ///< what else changes the figures: "quick", a trace file's name
  bool operator==(const RunIdentity&) const = default;
};

enum class RowTable { Firings, Margins };

/// Until `finish` nothing in it claims to be complete. When it goes without
/// `finish` or `keep_unfinished`, what it wrote is removed and what it replaced is put back.
class RunDirectory {
 public:
  /// \param chosen  the directory the user named, or nothing: cistern-run/COMMAND, always replaced.
  ///   A named one may be absent, empty or hold a run of the same identity. InputError otherwise.
  RunDirectory(const std::optional<std::filesystem::path>& chosen, const RunIdentity& identity);
  ~RunDirectory();
  RunDirectory(const RunDirectory&) = delete;
  RunDirectory& operator=(const RunDirectory&) = delete;

  [[nodiscard]] const std::filesystem::path& path() const noexcept;
  [[nodiscard]] bool is_resumed() const noexcept;

  /// Unit results kept for a resumption, by stage of the run ("background", "signals").
  void keep_unit(std::string_view stage, std::int64_t unit, std::string_view result);
  [[nodiscard]] std::optional<std::string> recall_unit(std::string_view stage, std::int64_t unit);

  /// Makes an empty table and its CSV file; rows may follow.
  void make_table(RowTable table);
  /// Rows, streamed; both run.sqlite and the CSV file of the same name get them.
  void add_firing(const FiringRow& row);
  void add_margin(const MarginRow& row);

  /// Any other file, whole, by name. \param text  its bytes
  void write_file(std::string_view name, std::string_view text);

  /// An interrupted run: everything so far stays and can be resumed.
  void keep_unfinished();
  /// Figures, requirements, junit.xml (where there are requirements), and last summary.json.
  void finish(const Summary& summary);

 private:
  struct State;
  std::unique_ptr<State> state_;
};

}  // namespace cistern
