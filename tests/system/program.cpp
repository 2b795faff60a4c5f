#include "tests/system/program.hpp"

#include <stdlib.h>
#include <sys/wait.h>

#include <cstdlib>
#include <fstream>
#include <sstream>
#include <stdexcept>

namespace cistern {
namespace fs = std::filesystem;

ScratchDirectory::ScratchDirectory() {
  std::string name = (fs::temp_directory_path() / "cistern-system-XXXXXX").string();
  if (::mkdtemp(name.data()) == nullptr) throw std::runtime_error("no scratch directory");
  path_ = name;
}

ScratchDirectory::~ScratchDirectory() {
  std::error_code ignored;
  fs::remove_all(path_, ignored);
}

void ScratchDirectory::write(const std::string& name, const std::string& text) const {
  std::ofstream(path_ / name, std::ios::binary) << text;
}

std::string ScratchDirectory::read(const std::string& name) const {
  std::ifstream stream(path_ / name, std::ios::binary);
  std::ostringstream text;
  text << stream.rdbuf();
  return text.str();
}

ProgramRun run_shell(const ScratchDirectory& directory, const std::string& command) {
  const std::string in_directory = "cd '" + directory.path().string() +
                                   "' && PATH='" CISTERN_FOLDER "':\"$PATH\" && ( " + command +
                                   " ) >.out 2>.err </dev/null";
  const int status = std::system(in_directory.c_str());
  ProgramRun run;
  run.status = WIFEXITED(status) ? WEXITSTATUS(status) : 128 + WTERMSIG(status);
  run.output = directory.read(".out");
  run.errors = directory.read(".err");
  return run;
}

ProgramRun run_cistern(const ScratchDirectory& directory, const std::string& arguments) {
  return run_shell(directory, "cistern " + arguments);
}

std::string requirement(const std::string& figure, const std::string& bound) {
  return "\n[requirements.r]\nfigure = \"" + figure + "\"\n" + bound + "\n";
}

std::string small_scenario() {
  return R"([digitizer]
channels = 2
sample_rate_mhz = 100
bits = 12
baseline_counts = [200, 210]

[calibration]
height_counts_per_vem = [140, 138]
area_counts_per_vem = [1020, 1000]

[[trigger]]
name = "tall"
role = "in_service"
kind = "threshold"
level_vem = 1.5
majority = 2

[[trigger]]
name = "broad"
role = "in_service"
kind = "boxcar_sum"
length_samples = 60
sum_counts = 1500
majority = 1

[[trigger]]
name = "long"
role = "candidate"
kind = "time_over_threshold"
level_counts = 40
window_samples = 150
min_samples_over = 21
majority = 2
)";
}

std::string tank_scenario() {
  return small_scenario() + R"(
[tank]

[[signal]]
name = "muon"
kind = "muon"
sizes_vem = [1, 3]

[qualify]
signals_per_point = 60
live_time_s = 0.4
quick_signals_per_point = 20
quick_live_time_s = 0.2
block_s = 0.05

[rate]
live_time_s = 0.2
quick_live_time_s = 0.1
block_s = 0.05
)";
}

}  // namespace cistern
