#include "bench/experiments/live_time.hpp"

#include <algorithm>

#include "bench/campaign/packing.hpp"
#include "traces/base/rounding.hpp"

namespace cistern {
namespace {
constexpr std::int64_t samples_per_piece = 16'384;  // fits the cache next to what makes it
constexpr double unit_live_time_s = 0.25;           // a stop is answered within about a second
}  // namespace

LiveTimePlan::LiveTimePlan(double live_time_s, double block_s, const StationPlan& station)
    : sample_rate_hz_(station.digitizer.sample_rate_mhz * 1e6),
      samples_per_block_(std::max<std::int64_t>(1, round_half_up(block_s * sample_rate_hz_))),
      blocks_(std::max<std::int64_t>(1, round_half_up(live_time_s / block_s))),
      blocks_per_unit_(std::max<std::int64_t>(1, round_half_up(unit_live_time_s / block_s))),
      run_up_samples_(station.longest_reach_samples + station.longest_hold_off_samples) {}

std::int64_t LiveTimePlan::end_block(std::int64_t unit) const noexcept {
  return std::min(blocks_, (unit + 1) * blocks_per_unit_);
}

std::int64_t LiveTimePlan::run_up_start(std::int64_t unit) const {
  return std::max<std::int64_t>(0, first_sample(unit) - run_up_samples_);
}

double LiveTimePlan::block_s() const { return static_cast<double>(samples_per_block_) / sample_rate_hz_; }

std::string observe_live_unit(const StationPlan& plan, const TraceGenerator& generator, const LiveTimePlan& time,
                              std::int64_t unit, std::vector<std::unique_ptr<LiveObserver>> observers) {
  Waveform waveform;
  Codes codes;
  const std::int64_t end = time.end_sample(unit);
  for (std::int64_t at = time.run_up_start(unit); at < end; at += samples_per_piece) {
    generator.make_background(0, at, static_cast<std::size_t>(std::min(samples_per_piece, end - at)), waveform);
    digitize(plan.digitizer, waveform, codes);
    for (const auto& observer : observers) observer->take(codes.view());
  }
  Packer packer;
  for (const auto& observer : observers) {
    const std::string seen = observer->finish();
    packer.put_all(std::vector<char>(seen.begin(), seen.end()));
  }
  return packer.take();
}

std::vector<std::string> unpack_observed(std::string_view bytes, std::size_t observers) {
  Unpacker unpacker(bytes);
  std::vector<std::string> seen;
  for (std::size_t i = 0; i < observers; ++i) {
    const auto one = unpacker.get_all<char>();
    seen.emplace_back(one.begin(), one.end());
  }
  return seen;
}

}  // namespace cistern
