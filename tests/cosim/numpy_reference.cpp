#include "tests/cosim/numpy_reference.hpp"

#include <cstdlib>
#include <fstream>
#include <nlohmann/json.hpp>
#include <sstream>
#include <stdexcept>

namespace cistern {
namespace {

nlohmann::json settings_json(const NumpyCase& one) {
  const ConditionSettings& condition = one.settings.condition;
  const FiringSettings& firing = one.settings.firing;
  nlohmann::json trigger = {
      {"name", one.settings.name},
      {"kind", name_of(condition.kind)},
      {"baseline_counts", condition.baseline_counts},
      {"channel_enabled", condition.channel_enabled},
      {"level_counts", condition.level_counts},
      {"window_samples", condition.window_samples},
      {"min_samples_over", condition.min_samples_over},
      {"length_samples", condition.length_samples},
      {"sum_counts", condition.sum_counts},
      {"majority", condition.majority},
      {"enabled", firing.enabled},
      {"hold_off_samples", firing.hold_off_samples},
      {"rearm", firing.rearm == Rearm::Level ? "level" : "edge"},
      {"prescale", firing.prescale},
  };
  return {{"sample_rate_mhz", 100}, {"contiguous", one.contiguous}, {"triggers", {trigger}}};
}

/// NumPy format 1.0: magic, version, length of the header, header, codes in C order.
void write_npy(const std::filesystem::path& path, const std::vector<Codes>& traces) {
  std::ofstream file(path, std::ios::binary);
  std::ostringstream header;
  header << "{'descr': '<i2', 'fortran_order': False, 'shape': (" << traces.size() << ", " << traces.front().channels()
         << ", " << traces.front().samples() << "), }";
  std::string text = header.str();
  text.append(63 - (10 + text.size()) % 64, ' ');
  text.push_back('\n');
  file << std::string("\x93NUMPY\x01\x00", 8) << static_cast<char>(text.size() & 0xFFU)
       << static_cast<char>(text.size() >> 8U) << text;
  for (const Codes& trace : traces) {
    for (std::size_t c = 0; c < trace.channels(); ++c) {
      const std::span<const std::int16_t> codes = trace.channel(c);
      file.write(reinterpret_cast<const char*>(codes.data()), static_cast<std::streamsize>(codes.size_bytes()));
    }
  }
}

/// The cells of every line but the first.
std::vector<std::vector<std::string>> read_cells(const std::filesystem::path& path) {
  std::ifstream file(path);
  std::vector<std::vector<std::string>> rows;
  std::string line;
  std::getline(file, line);
  while (std::getline(file, line)) {
    std::vector<std::string>& cells = rows.emplace_back();
    std::istringstream text(line);
    for (std::string cell; std::getline(text, cell, ',');) cells.push_back(cell);
  }
  return rows;
}

NumpyAnswer read_answer(const std::filesystem::path& firings, const std::filesystem::path& margins) {
  NumpyAnswer answer;
  for (const auto& cells : read_cells(firings)) {
    answer.firings.push_back(
        {std::stoll(cells.at(0)), std::stoll(cells.at(2)), std::stoll(cells.at(4)), cells.at(5), cells.at(6) == "1"});
  }
  for (const auto& cells : read_cells(margins)) {
    answer.margins.push_back({std::stoll(cells.at(0)), std::stoll(cells.at(2)), std::stoll(cells.at(3))});
  }
  return answer;
}

}  // namespace

std::vector<NumpyAnswer> ask_numpy(const std::vector<NumpyCase>& cases, const std::filesystem::path& folder) {
  std::ofstream list(folder / "list.txt");
  const auto file_of = [&folder](std::size_t k, const char* name) { return folder / (std::to_string(k) + name); };
  for (std::size_t k = 0; k < cases.size(); ++k) {
    std::ofstream(file_of(k, "-settings.json")) << settings_json(cases[k]);
    write_npy(file_of(k, "-traces.npy"), cases[k].traces);
    list << file_of(k, "-settings.json").string() << ' ' << file_of(k, "-traces.npy").string() << ' '
         << file_of(k, "-firings.csv").string() << ' ' << file_of(k, "-margins.csv").string() << '\n';
  }
  list.close();
  const std::string command =
      std::string(CISTERN_NUMPY_PYTHON) + " " + CISTERN_NUMPY_REFERENCE + " --batch " + (folder / "list.txt").string();
  if (std::system(command.c_str()) != 0) throw std::runtime_error("failed: " + command);
  std::vector<NumpyAnswer> answers;
  for (std::size_t k = 0; k < cases.size(); ++k) {
    answers.push_back(read_answer(file_of(k, "-firings.csv"), file_of(k, "-margins.csv")));
  }
  return answers;
}

}  // namespace cistern
