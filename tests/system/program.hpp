#pragma once
/// \file
/// Runs the real program in a directory of its own.
#include <filesystem>
#include <string>

namespace cistern {

struct ProgramRun {
  int status{0};  ///< exit status; 128 + signal when killed
  std::string output;
  std::string errors;
};

/// A fresh directory, removed at the end of its life.
class ScratchDirectory {
 public:
  ScratchDirectory();
  ~ScratchDirectory();
  ScratchDirectory(const ScratchDirectory&) = delete;
  ScratchDirectory& operator=(const ScratchDirectory&) = delete;
  [[nodiscard]] const std::filesystem::path& path() const noexcept { return path_; }
  void write(const std::string& name, const std::string& text) const;
  [[nodiscard]] std::string read(const std::string& name) const;

 private:
  std::filesystem::path path_;
};

/// \param arguments  a shell's words after `cistern`; run inside `directory`
[[nodiscard]] ProgramRun run_cistern(const ScratchDirectory& directory, const std::string& arguments);

/// \param command  for the shell, which finds `cistern`; run inside `directory`
[[nodiscard]] ProgramRun run_shell(const ScratchDirectory& directory, const std::string& command);

/// [requirements.r]: one bound on one figure, to append to a scenario.
[[nodiscard]] std::string requirement(const std::string& figure, const std::string& bound);

/// [digitizer] and one trigger of each kind: enough for `replay` and the logic part of `qualify`.
[[nodiscard]] std::string small_scenario();

/// small_scenario() and a tank: makes synthetic traces.
[[nodiscard]] std::string tank_scenario();

}  // namespace cistern
