#include "bench/results/occupant.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <set>

#include "bench/results/database.hpp"
#include "traces/base/errors.hpp"

namespace cistern {
namespace fs = std::filesystem;
namespace {

constexpr const char* expected = "expected a directory that is absent, empty or holds the same run";

/// Everything that a run leaves, finished or not; `.replaced` is what a killed one was about to replace.
constexpr std::array<std::string_view, 12> files_of_a_run{
    "summary.json", ".summary.json.part", "run.sqlite",  "run.sqlite-wal", "run.sqlite-shm", "run.sqlite-journal",
    "report.html",  "junit.xml",          "timing.json", "firings.csv",    "margins.csv",    ".replaced"};

[[noreturn]] void refuse(const fs::path& directory, const std::string& what) {
  throw InputError("--out " + directory.string(), what);
}

/// The first by name, so that the message does not hang on the file system's order.
std::optional<std::string> stranger_in(const fs::path& directory) {
  std::set<std::string> strangers;
  for (const auto& entry : fs::directory_iterator(directory)) {
    const std::string name = entry.path().filename().string();
    if (std::find(files_of_a_run.begin(), files_of_a_run.end(), name) == files_of_a_run.end()) strangers.insert(name);
  }
  return strangers.empty() ? std::nullopt : std::optional(*strangers.begin());
}

/// Whose run is in `directory`; nothing when there is none that can be read.
std::optional<RunIdentity> identity_in(const fs::path& directory) {
  if (!fs::exists(directory / "run.sqlite")) return {};
  try {
    Database database(directory / "run.sqlite", DatabaseUse::Read);
    const auto text = [&](const char* key) {
      return database.first_text("SELECT value FROM run WHERE key = ?", {Cell{std::string_view{key}}}).value_or("");
    };
    return RunIdentity{text("command"), text("scenario"), std::stoull("0" + text("seed")), text("version"),
                       text("options")};
  } catch (const std::exception&) {
    return {};
  }
}

std::string difference(const RunIdentity& found, const RunIdentity& wanted) {
  const auto differ = [](const char* what, const std::string& was, const std::string& is) {
    return fmt::format("holds a run with {} \"{}\", this one has \"{}\"", what, was, is);
  };
  if (found.command != wanted.command) return differ("command", found.command, wanted.command);
  if (found.scenario != wanted.scenario) return differ("scenario digest", found.scenario, wanted.scenario);
  if (found.seed != wanted.seed) return differ("seed", std::to_string(found.seed), std::to_string(wanted.seed));
  if (found.version != wanted.version) return differ("version", found.version, wanted.version);
  return differ("options", found.options, wanted.options);
}

}  // namespace

bool holds_something(const fs::path& directory) {
  return fs::exists(directory) && fs::directory_iterator(directory) != fs::directory_iterator{};
}

void refuse_file(const fs::path& path) {
  if (fs::exists(path) && !fs::is_directory(path)) refuse(path, fmt::format("is a file; {}", expected));
}

void refuse_strangers(const fs::path& directory, const RunIdentity& wanted) {
  if (const auto stranger = stranger_in(directory)) {
    refuse(directory, fmt::format("holds {}, which no run of cistern wrote; {}", *stranger, expected));
  }
  const auto found = identity_in(directory);
  if (!found) refuse(directory, fmt::format("holds files that are no run of cistern; {}", expected));
  if (!(*found == wanted)) {
    refuse(directory, difference(*found, wanted) + "; choose another directory or remove it");
  }
}

}  // namespace cistern
