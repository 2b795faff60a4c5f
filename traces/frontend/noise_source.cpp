#include "traces/frontend/noise_source.hpp"

#include <algorithm>
#include <array>

#include "traces/base/errors.hpp"
#include "traces/frontend/noise_filter.hpp"
#include "traces/frontend/noise_kernel.hpp"

namespace cistern {
namespace {

constexpr std::size_t block_size = noise_block;
constexpr std::uint32_t groups_per_block = block_size / noise_group;
/// The white numbers before a block that its first samples need.
constexpr std::size_t history = 16;
static_assert(noise_taps_max - 1 <= history && history <= noise_group);

PhiloxStream stream_of(std::uint64_t campaign_seed, Purpose purpose, std::uint64_t index) {
  return {
      {static_cast<std::uint32_t>(index), static_cast<std::uint32_t>(index >> 32), static_cast<std::uint32_t>(purpose)},
      {static_cast<std::uint32_t>(campaign_seed), static_cast<std::uint32_t>(campaign_seed >> 32)}};
}

}  // namespace

NoiseSource::NoiseSource(const FrontendConfig& config, std::uint64_t campaign_seed) : campaign_seed_(campaign_seed) {
  const double rms_counts = config.noise_rms_mv * config.counts_per_mv;
  for (const double tap : noise_taps(config.noise_correlation)) taps_.push_back(static_cast<float>(tap * rms_counts));
  CISTERN_ASSERT(taps_.size() <= noise_taps_max);
}

void NoiseSource::write(Purpose purpose, std::uint64_t index, std::int64_t first, std::span<float> out) const {
  CISTERN_ASSERT(first >= 0);
  std::size_t done = 0;
  while (done < out.size()) {
    const std::int64_t at = first + static_cast<std::int64_t>(done);
    const auto in_block = static_cast<std::size_t>(at % noise_block);
    const std::size_t count = std::min(out.size() - done, block_size - in_block);
    write_in_block(purpose, index, at / noise_block, in_block, out.subspan(done, count));
    done += count;
  }
}

void NoiseSource::write_in_block(Purpose purpose, std::uint64_t index, std::int64_t block, std::size_t first,
                                 std::span<float> out) const {
  alignas(64) std::array<float, noise_group + block_size> white;
  float* const start = white.data() + noise_group;  // of the block
  const std::uint64_t own = index + static_cast<std::uint64_t>(block);
  if (first < history) {
    // The last numbers of the block before. Block 0 has none, and takes the group after its own last.
    const bool is_first_block = block == 0;
    white_noise(stream_of(campaign_seed_, purpose, is_first_block ? own : own - 1),
                is_first_block ? groups_per_block : groups_per_block - 1, {white.data(), noise_group});
  }
  const std::size_t first_group = first < history ? 0 : (first - history) / noise_group;
  const std::size_t end_group = (first + out.size() + noise_group - 1) / noise_group;
  white_noise(stream_of(campaign_seed_, purpose, own), static_cast<std::uint32_t>(first_group),
              {start + first_group * noise_group, (end_group - first_group) * noise_group});
  filter_noise(taps_, start + first, out);
}

}  // namespace cistern
