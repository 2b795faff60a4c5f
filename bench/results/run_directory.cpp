#include "bench/results/run_directory.hpp"

#include <fmt/format.h>

#include <utility>

#include "bench/results/csv_file.hpp"
#include "bench/results/database.hpp"
#include "bench/results/directory_lock.hpp"
#include "bench/results/occupant.hpp"
#include "bench/results/summary_text.hpp"
#include "traces/base/errors.hpp"

namespace cistern {
namespace fs = std::filesystem;
namespace {

constexpr const char* replaced_name = ".replaced";

bool is_complete(const fs::path& directory) { return fs::exists(directory / "summary.json"); }

void move_entries(const fs::path& from, const fs::path& to) {
  std::vector<fs::path> entries;
  for (const auto& entry : fs::directory_iterator(from)) entries.push_back(entry.path());
  fs::create_directories(to);
  for (const auto& entry : entries) {
    if (entry != to) fs::rename(entry, to / entry.filename());
  }
}

}  // namespace

struct RunDirectory::State {
  fs::path path;
  bool made_directory{false};
  bool resumed{false};
  bool settled{false};
  std::optional<DirectoryLock> lock;
  std::unique_ptr<Database> database;
  std::unique_ptr<Statement> add_firing;
  std::unique_ptr<Statement> add_margin;
  std::optional<CsvFile> firings;
  std::optional<CsvFile> margins;
  std::int64_t rows_pending{0};

  fs::path replaced() const { return path / replaced_name; }

  void prepare_directory(const std::optional<fs::path>& chosen, const RunIdentity& identity);
  void open_database(const RunIdentity& identity);
  void open_or_undo(const RunIdentity& identity);
  void commit() {
    database->execute("COMMIT; BEGIN");
    rows_pending = 0;
  }
  void count_row() {
    if (++rows_pending >= 10'000) commit();
  }
  void close_files();
  void undo();
};

void RunDirectory::State::prepare_directory(const std::optional<fs::path>& chosen, const RunIdentity& identity) {
  path = chosen ? *chosen : fs::path("cistern-run") / identity.command;
  refuse_file(path);
  made_directory = !fs::exists(path);
  fs::create_directories(path);
  lock.emplace(path);
  if (chosen && holds_something(path)) {
    refuse_strangers(path, identity);
    resumed = !is_complete(path);
  }
  fs::remove_all(replaced());
  if (!resumed && holds_something(path)) move_entries(path, replaced());
}

void RunDirectory::State::open_database(const RunIdentity& identity) {
  database = std::make_unique<Database>(path / "run.sqlite");
  database->execute(
      "CREATE TABLE IF NOT EXISTS run(key TEXT PRIMARY KEY, value TEXT);"
      "CREATE TABLE IF NOT EXISTS units(stage TEXT, unit INTEGER, result BLOB, PRIMARY KEY(stage, unit));"
      "DROP TABLE IF EXISTS firings; DROP TABLE IF EXISTS margins;");
  Statement put(*database, "INSERT OR REPLACE INTO run VALUES(?, ?)");
  const auto seed = std::to_string(identity.seed);
  const std::pair<std::string_view, std::string_view> rows[] = {{"command", identity.command},
                                                                {"scenario", identity.scenario},
                                                                {"seed", seed},
                                                                {"version", identity.version},
                                                                {"options", identity.options}};
  for (const auto& [key, value] : rows) put.run({Cell{key}, Cell{value}});
  database->execute("BEGIN");
}

void RunDirectory::State::open_or_undo(const RunIdentity& identity) {
  try {
    open_database(identity);
  } catch (...) {
    undo();
    throw;
  }
}

void RunDirectory::State::close_files() {
  if (firings) firings->close();
  if (margins) margins->close();
  add_firing.reset();
  add_margin.reset();
  database->execute("COMMIT");
}

void RunDirectory::State::undo() {
  add_firing.reset();
  add_margin.reset();
  firings.reset();
  margins.reset();
  database.reset();
  if (resumed) return;  // what was there before is still there, and can be resumed again
  std::error_code ignored;
  const bool had_something = fs::exists(replaced());
  for (const auto& entry : fs::directory_iterator(path, ignored)) {
    if (entry.path() != replaced()) fs::remove_all(entry.path(), ignored);
  }
  if (had_something) {
    for (const auto& entry : fs::directory_iterator(replaced(), ignored)) {
      fs::rename(entry.path(), path / entry.path().filename(), ignored);
    }
    fs::remove_all(replaced(), ignored);
  } else if (made_directory) {
    fs::remove(path, ignored);
  }
}

RunDirectory::RunDirectory(const std::optional<fs::path>& chosen, const RunIdentity& identity)
    : state_(std::make_unique<State>()) {
  try {
    state_->prepare_directory(chosen, identity);
    state_->open_or_undo(identity);
  } catch (const fs::filesystem_error& error) {
    throw SystemFault(fmt::format("{}: {}", state_->path.string(), error.code().message()));
  }
}

RunDirectory::~RunDirectory() {
  if (!state_->settled) state_->undo();
}

const fs::path& RunDirectory::path() const noexcept { return state_->path; }
bool RunDirectory::is_resumed() const noexcept { return state_->resumed; }

void RunDirectory::keep_unit(std::string_view stage, std::int64_t unit, std::string_view result) {
  Statement(*state_->database, "INSERT OR REPLACE INTO units VALUES(?, ?, ?)")
      .run({Cell{stage}, Cell{unit}, Blob{result}});
  state_->commit();
}

std::optional<std::string> RunDirectory::recall_unit(std::string_view stage, std::int64_t unit) {
  if (!state_->resumed) return {};
  return state_->database->first_text("SELECT result FROM units WHERE stage = ? AND unit = ?",
                                      {Cell{stage}, Cell{unit}});
}

void RunDirectory::make_table(RowTable table) {
  if (table == RowTable::Firings) {
    state_->database->execute(
        "CREATE TABLE firings(trace INTEGER, trigger TEXT, sample INTEGER, time_ns INTEGER, onset_sample INTEGER, "
        "status TEXT, start_unknown INTEGER)");
    state_->add_firing =
        std::make_unique<Statement>(*state_->database, "INSERT INTO firings VALUES(?, ?, ?, ?, ?, ?, ?)");
    state_->firings.emplace(state_->path / "firings.csv",
                            "trace,trigger,sample,time_ns,onset_sample,status,start_unknown");
    return;
  }
  state_->database->execute(
      "CREATE TABLE margins(trace INTEGER, trigger TEXT, sample INTEGER, margin INTEGER, unit TEXT)");
  state_->add_margin = std::make_unique<Statement>(*state_->database, "INSERT INTO margins VALUES(?, ?, ?, ?, ?)");
  state_->margins.emplace(state_->path / "margins.csv", "trace,trigger,sample,margin,unit");
}

void RunDirectory::add_firing(const FiringRow& row) {
  const auto text = [](const std::optional<long long>& value) {
    return value ? std::to_string(*value) : std::string{};
  };
  state_->add_firing->run({Cell{std::int64_t{row.trace}}, Cell{std::string_view{row.trigger}},
                           Cell{std::int64_t{row.sample}}, cell_of(row.time_ns), cell_of(row.onset_sample),
                           Cell{std::string_view{row.status}}, Cell{std::int64_t{row.start_unknown}}});
  state_->firings->add(fmt::format("{},{},{},{},{},{},{}", row.trace, row.trigger, row.sample, text(row.time_ns),
                                   text(row.onset_sample), row.status, row.start_unknown ? 1 : 0));
  state_->count_row();
}

void RunDirectory::add_margin(const MarginRow& row) {
  state_->add_margin->run({Cell{std::int64_t{row.trace}}, Cell{std::string_view{row.trigger}},
                           Cell{std::int64_t{row.sample}}, Cell{std::int64_t{row.margin}},
                           Cell{std::string_view{row.unit}}});
  state_->margins->add(fmt::format("{},{},{},{},{}", row.trace, row.trigger, row.sample, row.margin, row.unit));
  state_->count_row();
}

void RunDirectory::write_file(std::string_view name, std::string_view text) {
  write_whole_file(state_->path / name, text);
}

void RunDirectory::keep_unfinished() {
  state_->close_files();
  state_->settled = true;
  std::error_code ignored;
  fs::remove_all(state_->replaced(), ignored);
}

void RunDirectory::finish(const Summary& summary) {
  state_->database->execute(
      "DROP TABLE IF EXISTS figures; DROP TABLE IF EXISTS requirements;"
      "CREATE TABLE figures(name TEXT, value REAL, low REAL, high REAL, systematic_low REAL, systematic_high REAL, "
      "unit TEXT, note TEXT);"
      "CREATE TABLE requirements(name TEXT, bound TEXT, value REAL, low REAL, high REAL, verdict TEXT, reason TEXT);");
  {
    Statement add(*state_->database, "INSERT INTO figures VALUES(?, ?, ?, ?, ?, ?, ?, ?)");
    for (const Figure& f : summary.figures) {
      add.run({Cell{std::string_view{f.name}}, cell_of(f.value), cell_of(f.low), cell_of(f.high),
               cell_of(f.systematic_low), cell_of(f.systematic_high), Cell{std::string_view{f.unit}},
               Cell{std::string_view{f.note}}});
    }
    Statement require(*state_->database, "INSERT INTO requirements VALUES(?, ?, ?, ?, ?, ?, ?)");
    for (const RequirementOutcome& r : summary.requirements) {
      require.run({Cell{std::string_view{r.name}}, Cell{std::string_view{r.bound}}, cell_of(r.value), cell_of(r.low),
                   cell_of(r.high), Cell{std::string_view{r.verdict}}, Cell{std::string_view{r.reason}}});
    }
  }
  state_->close_files();
  state_->database->execute("DROP TABLE units");
  state_->database->execute("VACUUM");
  state_->database->settle();
  state_->database.reset();
  if (!summary.requirements.empty()) write_file("junit.xml", junit_xml(summary));
  write_file(".summary.json.part", summary_json(summary));
  fs::rename(state_->path / ".summary.json.part", state_->path / "summary.json");
  state_->settled = true;
  std::error_code ignored;
  fs::remove_all(state_->replaced(), ignored);
}

}  // namespace cistern
