#include "tests/cosim/icarus_bench.hpp"

#include <fmt/format.h>

#include <cstdio>
#include <cstdlib>
#include <fstream>
#include <iostream>
#include <stdexcept>
#include <string>

namespace cistern {
namespace {

/// A Verilog literal with one field of `bits` per channel, channel 0 lowest.
template <typename Values>
std::string packed(const Values& values, int bits) {
  std::string digits;
  for (const auto value : values) {
    const auto word = static_cast<std::uint64_t>(static_cast<std::int64_t>(value));
    digits = fmt::format("{:016x}", word).substr(static_cast<std::size_t>(16 - bits / 4)) + digits;
  }
  return fmt::format("{}'h{}", values.size() * static_cast<std::size_t>(bits), digits);
}

std::string mask_of(const std::vector<bool>& enabled) {
  std::string digits;
  for (const bool one : enabled) digits.insert(digits.begin(), one ? '1' : '0');
  return fmt::format("{}'b{}", enabled.size(), digits);
}

std::string kind_parameters(const ConditionSettings& condition) {
  switch (condition.kind) {
    case TriggerKind::Threshold:
      return fmt::format(".LEVEL({})", packed(condition.level_counts, 32));
    case TriggerKind::TimeOverThreshold:
      return fmt::format(".LEVEL({}), .WINDOW({}), .MIN_OVER({})", packed(condition.level_counts, 32),
                         condition.window_samples, condition.min_samples_over);
    case TriggerKind::BoxcarSum:
      break;
  }
  return fmt::format(".LENGTH({}), .SUM({})", condition.length_samples, packed(condition.sum_counts, 64));
}

void write_settings(const TriggerSettings& settings, std::size_t samples, const std::filesystem::path& path) {
  const ConditionSettings& condition = settings.condition;
  const std::size_t channels = condition.baseline_counts.size();
  std::ofstream file(path);
  file << fmt::format("`define TRIGGER {}\n`define BENCH_CHANNELS {}\n`define CLOCKS {}\n", name_of(condition.kind),
                      channels, samples);
  file << fmt::format(
      "`define PARAMETERS .CHANNELS({}), .BASELINE({}), {}, .MASK({}), .MAJORITY({}), .HOLD_OFF({}), "
      ".REARM_LEVEL(1'b{}), .PRESCALE({})\n",
      channels, packed(condition.baseline_counts, 16), kind_parameters(condition), mask_of(condition.channel_enabled),
      condition.majority, settings.firing.hold_off_samples, settings.firing.rearm == Rearm::Level ? 1 : 0,
      settings.firing.prescale);
}

void write_stimuli(const CodesView& codes, const std::filesystem::path& path) {
  std::ofstream file(path);
  for (std::size_t s = 0; s < codes.samples(); ++s) {
    for (std::size_t c = codes.channels(); c > 0; --c) file << fmt::format("{:04x}", codes.channel(c - 1)[s]);
    file << '\n';
  }
}

/// One digit a clock: fire 1, held off 2, prescaled 4.
void write_expected(const std::vector<Firing>& expected, std::size_t samples, const std::filesystem::path& path) {
  std::string text;
  for (std::size_t s = 0; s < samples; ++s) text += "0\n";
  for (const Firing& firing : expected) {
    char& digit = text.at(2 * static_cast<std::size_t>(firing.sample));
    if (firing.status == FiringStatus::Passed) digit = '1';
    if (firing.status == FiringStatus::HeldOff) digit = '2';
    if (firing.status == FiringStatus::Prescaled) digit = '4';
  }
  std::ofstream(path) << text;
}

void run_command(const std::string& command) {
  if (std::system(command.c_str()) != 0) throw std::runtime_error("failed: " + command);
}

/// The last line of the bench; lines before it name differences and are passed on.
IcarusTotals read_totals(const std::filesystem::path& path) {
  std::ifstream file(path);
  long long clocks = 0;
  long long firings = 0;
  long long differences = 0;
  for (std::string line; std::getline(file, line);) {
    if (std::sscanf(line.c_str(), "clocks %lld firings %lld differences %lld", &clocks, &firings, &differences) == 3) {
      return {clocks, firings, differences};
    }
    std::cout << line << '\n';
  }
  throw std::runtime_error("the bench printed no totals");
}

}  // namespace

IcarusTotals run_in_icarus(const TriggerSettings& settings, const CodesView& codes, const std::vector<Firing>& expected,
                           const std::filesystem::path& folder) {
  write_settings(settings, codes.samples(), folder / "settings.vh");
  write_stimuli(codes, folder / "stimuli.hex");
  write_expected(expected, codes.samples(), folder / "expected.hex");
  run_command(fmt::format("cd '{0}' && '{1}' -g2005 -o bench.vvp -I . -y '{2}' -s firing_bench '{2}/firing_bench.v'",
                          folder.string(), CISTERN_IVERILOG, CISTERN_COSIM_RTL));
  run_command(fmt::format("cd '{}' && '{}' -n bench.vvp > totals.txt", folder.string(), CISTERN_VVP));
  return read_totals(folder / "totals.txt");
}

}  // namespace cistern
