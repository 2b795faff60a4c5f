#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>

#include "bench/experiments/trace_tools.hpp"
#include "traces/files/description.hpp"

namespace cistern {
namespace {

constexpr std::size_t samples_per_block = 65'536;
constexpr std::size_t shown_bands = 8;

struct Survey {
  TraceFileInfo info;
  TraceDescription description;
};

Survey survey(const std::filesystem::path& file, const TraceProgress& progress) {
  const auto reader = open_trace_file(file);
  TraceSurvey gathered(reader->info().channels, reader->info().bits.value_or(15));
  TraceBlock block;
  while (reader->next(samples_per_block, block)) {
    gathered.take(block);
    if (block.last_of_trace) progress(block.trace + 1, reader->info().traces.value_or(0));
  }
  return {reader->info(), gathered.description()};
}

template <typename Value>
std::string or_unsaid(const std::optional<Value>& value, const char* unit) {
  return value ? fmt::format("{}{}", *value, unit) : "not said in the file";
}

/// Mean power in equal bands of the spectrum, dB relative to one count squared.
std::vector<double> band_powers_db(const std::vector<double>& spectrum) {
  std::vector<double> bands;
  if (spectrum.empty()) return bands;  // shorter than one spectrum
  const std::size_t width = (spectrum.size() - 1) / shown_bands;
  for (std::size_t band = 0; band < shown_bands && width > 0; ++band) {
    double power = 0;
    for (std::size_t k = 1 + band * width; k < 1 + (band + 1) * width; ++k) power += spectrum[k];
    bands.push_back(10 * std::log10(std::max(power, 1e-12)));
  }
  return bands;
}

}  // namespace

std::vector<std::string> describe_traces(const std::filesystem::path& file, const TraceProgress& progress) {
  const auto [info, description] = survey(file, progress);
  std::vector<std::string> lines{fmt::format("{}: {} traces, {} channels, {} samples each", file.string(),
                                             description.traces, info.channels, info.samples),
                                 "sampling rate: " + or_unsaid(info.sample_rate_mhz, " MHz"),
                                 "bits: " + or_unsaid(info.bits, ""),
                                 "selection: " + or_unsaid(info.selection, ""),
                                 "live time: " + or_unsaid(info.live_time_s, " s"),
                                 fmt::format("contiguous: {}", info.contiguous ? "yes" : "no")};
  if (info.baseline_counts)
    lines.push_back(fmt::format("baseline said in the file: {} counts", fmt::join(*info.baseline_counts, ", ")));
  lines.push_back(fmt::format("{:<8}{:>9}{:>9}{:>11}{:>9}{:>10}{:>11}{:>9}{:>11}", "channel", "smallest", "largest",
                              "mean", "rms", "baseline", "noise rms", "at zero", "saturated"));
  for (std::size_t c = 0; c < description.channels.size(); ++c) {
    const ChannelDescription& d = description.channels[c];
    lines.push_back(fmt::format("{:<8}{:>9}{:>9}{:>11.3f}{:>9.3f}{:>10}{:>11.3f}{:>9}{:>11}", c, d.smallest, d.largest,
                                d.mean, d.rms, d.baseline, d.noise_rms, d.at_zero,
                                info.bits ? std::to_string(d.at_largest_code) : "?"));
  }
  lines.emplace_back("all in counts; baseline is the most frequent code, noise rms that of the codes at and below it");
  const double nyquist_mhz = info.sample_rate_mhz.value_or(0) / 2;
  for (std::size_t c = 0; c < description.channels.size(); ++c) {
    const auto bands = band_powers_db(description.channels[c].spectrum);
    if (bands.empty()) continue;
    lines.push_back(fmt::format(
        "channel {} power in {} equal bands up to {}: {:.1f} dB (counts squared)", c, shown_bands,
        nyquist_mhz > 0 ? fmt::format("{} MHz", nyquist_mhz) : "half the sampling rate", fmt::join(bands, ", ")));
  }
  return lines;
}

std::string describe_traces_json(const std::filesystem::path& file, const TraceProgress& progress) {
  const auto [info, description] = survey(file, progress);
  using Json = nlohmann::ordered_json;
  Json json = {{"file", file.filename().string()},
               {"traces", description.traces},
               {"samples", info.samples},
               {"contiguous", info.contiguous}};
  if (info.sample_rate_mhz) json["sample_rate_mhz"] = *info.sample_rate_mhz;
  if (info.bits) json["bits"] = *info.bits;
  if (info.selection) json["selection"] = *info.selection;
  if (info.live_time_s) json["live_time_s"] = *info.live_time_s;
  if (info.baseline_counts) json["baseline_counts"] = *info.baseline_counts;
  json["channels"] = Json::array();
  for (const ChannelDescription& d : description.channels) {
    json["channels"].push_back({{"smallest_counts", d.smallest},
                                {"largest_counts", d.largest},
                                {"mean_counts", d.mean},
                                {"rms_counts", d.rms},
                                {"baseline_counts", d.baseline},
                                {"noise_rms_counts", d.noise_rms},
                                {"samples_at_zero", d.at_zero},
                                {"samples_at_largest_code", d.at_largest_code},
                                {"spectrum_counts2", d.spectrum}});
  }
  return json.dump(2) + "\n";
}

}  // namespace cistern
