#include "traces/files/slab_reader.hpp"

#include <algorithm>
#include <utility>

#include "traces/files/file_facts.hpp"

namespace cistern {
namespace {

constexpr std::int64_t usual_codes = 1 << 19;    // 1 MiB: stays in the second cache level of most machines
constexpr std::int64_t largest_codes = 1 << 23;  // 16 MiB, when chunks are that large

}  // namespace

SlabSize choose_slab(std::int64_t channels, std::int64_t samples, SlabSize chunk) {
  // Comparisons by division: the product of the dimensions may be any number.
  const auto fits = [&](std::int64_t traces, std::int64_t length, std::int64_t codes) {
    return length <= codes / channels && traces <= codes / (channels * length);
  };
  if (fits(chunk.traces, samples, chunk.traces > 1 ? largest_codes : usual_codes)) {
    const std::int64_t chunks = std::max<std::int64_t>(1, usual_codes / (chunk.traces * channels * samples));
    return {chunks * chunk.traces, samples};
  }
  if (!fits(1, chunk.samples, largest_codes)) return {1, usual_codes / channels};
  return {1, chunk.samples * std::max<std::int64_t>(1, usual_codes / (channels * chunk.samples))};
}

SlabReader::SlabReader(std::string name, TraceFileInfo info, SlabSize size, bool is_unsigned,
                       std::unique_ptr<CodesSource> source)
    : name_(std::move(name)),
      info_(std::move(info)),
      size_(size),
      is_unsigned_(is_unsigned),
      source_(std::move(source)),
      bits_(info_.bits.value_or(15)) {}

void SlabReader::expect_bits(std::int32_t bits) {
  CISTERN_ASSERT(bits >= 4 && bits <= 15 && codes_.empty());
  if (!info_.bits) bits_ = bits;
}

bool SlabReader::next(std::size_t max_samples, TraceBlock& block) {
  CISTERN_ASSERT(max_samples >= 1);
  if (trace_ == *info_.traces) return false;
  const bool is_in_slab = trace_ < slab_.trace + slab_.traces && sample_ < slab_.first_sample + slab_.samples;
  if (!is_in_slab) fetch_slab();
  const auto offset = static_cast<std::size_t>(sample_ - slab_.first_sample);
  const std::size_t count = std::min(max_samples, static_cast<std::size_t>(slab_.samples) - offset);
  const std::int64_t end = sample_ + static_cast<std::int64_t>(count);
  block = {trace_, sample_, end == static_cast<std::int64_t>(info_.samples), source_->start_of(trace_),
           codes_in_slab(trace_).part(offset, count)};
  sample_ = block.last_of_trace ? 0 : end;
  if (block.last_of_trace) ++trace_;
  return true;
}

void SlabReader::fetch_slab() {
  slab_ = {trace_, std::min(size_.traces, *info_.traces - trace_), sample_,
           std::min(size_.samples, static_cast<std::int64_t>(info_.samples) - sample_)};
  codes_.resize(static_cast<std::size_t>(slab_.traces * slab_.samples) * info_.channels);
  source_->fetch(slab_, codes_);
  for (std::int64_t trace = slab_.trace; trace < slab_.trace + slab_.traces; ++trace) {
    check_codes(name_, {trace, slab_.first_sample, false, {}, codes_in_slab(trace)}, bits_, is_unsigned_);
  }
}

CodesView SlabReader::codes_in_slab(std::int64_t trace) const {
  const auto samples = static_cast<std::size_t>(slab_.samples);
  const auto run = static_cast<std::size_t>(trace - slab_.trace) * info_.channels;
  return {codes_.data() + run * samples, info_.channels, samples, samples};
}

}  // namespace cistern
