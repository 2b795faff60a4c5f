#include "firmware_model/station/capture_book.hpp"

#include <algorithm>
#include <limits>
#include <utility>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

constexpr std::array<std::pair<OverlapPolicy, std::string_view>, 3> policy_words = {{
    {OverlapPolicy::Ignore, "ignore"},
    {OverlapPolicy::Extend, "extend"},
    {OverlapPolicy::NewBuffer, "new_buffer"},
}};

/// Large enough for any station, small enough that copy_out_samples x max_samples fits 64 bits.
constexpr std::int64_t largest_length = std::numeric_limits<std::int32_t>::max();

bool in_range(std::int64_t value, std::int64_t smallest) { return value >= smallest && value <= largest_length; }

}  // namespace

std::string_view name_of(OverlapPolicy policy) { return policy_words[static_cast<std::size_t>(policy)].second; }

std::optional<OverlapPolicy> overlap_policy_named(std::string_view word) {
  for (const auto& [policy, name] : policy_words) {
    if (name == word) return policy;
  }
  return std::nullopt;
}

std::optional<std::string> fault_of(const CaptureConfig& config) {
  if (!in_range(config.pre_samples, 0)) return "pre_samples: 0 to 2147483647 expected";
  if (!in_range(config.post_samples, 1)) return "post_samples: 1 to 2147483647 expected";
  if (config.buffers < 1) return "buffers: at least 1 expected";
  if (!in_range(config.copy_out_samples, 0)) return "copy_out_samples: 0 to 2147483647 expected";
  if (!in_range(config.max_samples, config.pre_samples + config.post_samples)) {
    return "max_samples: at least pre_samples + post_samples and at most 2147483647 expected";
  }
  return std::nullopt;
}

std::string_view name_of(CaptureOutcome outcome) {
  constexpr std::array<std::string_view, capture_outcome_count> words = {"captured", "merged", "extended",
                                                                         "no_free_buffer"};
  return words[static_cast<std::size_t>(outcome)];
}

CaptureBook::CaptureBook(CaptureConfig config) : config_(config) {
  CISTERN_ASSERT(!fault_of(config));
  buffer_free_at_.assign(static_cast<std::size_t>(config.buffers), 0);
}

CaptureDecision CaptureBook::take(std::int64_t firing_sample) {
  CISTERN_ASSERT(firing_sample >= 0 && firing_sample >= last_firing_);
  CaptureDecision decision = last_decision_;
  if (firing_sample == last_firing_) {
    if (decision.capture) decision.outcome = CaptureOutcome::Merged;
  } else {
    const Stretches since = since_last_firing(firing_sample + 1);
    until_last_firing_.busy += since.busy;
    until_last_firing_.dead += since.dead;
    const std::optional<CaptureDecision> joined = join_open_capture(firing_sample);
    decision = joined ? *joined : open_capture(firing_sample);
  }
  last_firing_ = firing_sample;
  last_decision_ = decision;
  ++counts_[static_cast<std::size_t>(decision.outcome)];
  return decision;
}

std::optional<CaptureDecision> CaptureBook::join_open_capture(std::int64_t firing_sample) {
  if (firing_sample >= open_until()) return std::nullopt;
  const bool extended = config_.overlap == OverlapPolicy::Extend && extend_to(firing_sample + config_.post_samples);
  return CaptureDecision{extended ? CaptureOutcome::Extended : CaptureOutcome::Merged, captures_.size() - 1};
}

/// \return whether the open capture became longer
bool CaptureBook::extend_to(std::int64_t end_sample) {
  Capture& open = captures_.back();
  const std::int64_t end = std::min(end_sample, open.first_sample + config_.max_samples);
  if (end <= open.end_sample) return false;
  open.end_sample = end;
  schedule_copy_out(open);
  return true;
}

CaptureDecision CaptureBook::open_capture(std::int64_t firing_sample) {
  const auto free = std::find_if(buffer_free_at_.begin(), buffer_free_at_.end(),
                                 [&](std::int64_t free_at) { return free_at <= firing_sample; });
  if (free == buffer_free_at_.end()) return {CaptureOutcome::NoFreeBuffer, std::nullopt};
  if (!captures_.empty()) bus_free_at_ = captures_.back().free_at;
  Capture& capture = captures_.emplace_back();
  capture.firing_sample = firing_sample;
  capture.first_sample = std::max<std::int64_t>(0, firing_sample - config_.pre_samples);
  capture.end_sample = firing_sample + config_.post_samples;
  capture.buffer = static_cast<std::int32_t>(free - buffer_free_at_.begin());
  schedule_copy_out(capture);
  return {CaptureOutcome::Captured, captures_.size() - 1};
}

void CaptureBook::schedule_copy_out(Capture& capture) {
  const std::int64_t usual_length = config_.pre_samples + config_.post_samples;
  const std::int64_t length = std::max(usual_length, capture.end_sample - capture.first_sample);
  const std::int64_t duration = (config_.copy_out_samples * length + usual_length - 1) / usual_length;
  capture.copied_from = std::max(capture.end_sample, bus_free_at_);
  capture.free_at = capture.copied_from + duration;
  buffer_free_at_[static_cast<std::size_t>(capture.buffer)] = capture.free_at;
}

std::int64_t CaptureBook::earliest_free_at() const {
  return *std::min_element(buffer_free_at_.begin(), buffer_free_at_.end());
}

/// First sample at which a firing no longer joins the latest capture.
std::int64_t CaptureBook::open_until() const {
  const bool joins = config_.overlap != OverlapPolicy::NewBuffer && !captures_.empty();
  return joins ? captures_.back().end_sample : 0;
}

/// Between two firings buffers only become free, so no buffer is free up to earliest_free_at().
CaptureBook::Stretches CaptureBook::since_last_firing(std::int64_t end) const {
  const std::int64_t begin = last_firing_ + 1;
  const std::int64_t busy_until = std::min(end, earliest_free_at());
  return {std::max<std::int64_t>(0, busy_until - begin),
          std::max<std::int64_t>(0, busy_until - std::max(begin, open_until()))};
}

bool CaptureBook::has_free_buffer(std::int64_t sample) const {
  CISTERN_ASSERT(sample >= last_firing_);
  return earliest_free_at() <= sample;
}

std::int64_t CaptureBook::busy_samples(std::int64_t end) const {
  CISTERN_ASSERT(end > last_firing_);
  return until_last_firing_.busy + since_last_firing(end).busy;
}

std::int64_t CaptureBook::dead_samples(std::int64_t end) const {
  CISTERN_ASSERT(end > last_firing_);
  return until_last_firing_.dead + since_last_firing(end).dead;
}

std::int64_t CaptureBook::count(CaptureOutcome outcome) const { return counts_[static_cast<std::size_t>(outcome)]; }

}  // namespace cistern
