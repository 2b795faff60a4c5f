#include "bench/command_line/timing.hpp"

#include <fmt/chrono.h>
#include <fmt/format.h>
#include <unistd.h>

#include <array>
#include <nlohmann/json.hpp>

#include "bench/results/csv_file.hpp"

namespace cistern {

void write_timing(const std::filesystem::path& directory, const Stopwatch& stopwatch, int jobs, bool complete) {
  std::array<char, 256> host{};
  ::gethostname(host.data(), host.size() - 1);
  const auto started = std::chrono::system_clock::to_time_t(stopwatch.started());
  const nlohmann::ordered_json json = {{"started_utc", fmt::format("{:%Y-%m-%dT%H:%M:%SZ}", fmt::gmtime(started))},
                                       {"wall_s", stopwatch.seconds()},
                                       {"jobs", jobs},
                                       {"host", host.data()},
                                       {"complete", complete}};
  write_whole_file(directory / "timing.json", json.dump(2) + "\n");
}

}  // namespace cistern
