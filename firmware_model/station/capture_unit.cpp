#include "firmware_model/station/capture_unit.hpp"

#include <algorithm>
#include <utility>

#include "traces/base/errors.hpp"

namespace cistern {

std::optional<std::string> fault_of_ring(std::int64_t ring_samples, const CaptureConfig& config) {
  if (ring_samples > config.pre_samples) return std::nullopt;
  return "ring_samples: at least pre_samples + 1 = " + std::to_string(config.pre_samples + 1) + " expected";
}

CaptureUnit::CaptureUnit(const CaptureConfig& config, std::size_t channels, std::int64_t ring_samples)
    : book_(config), ring_(channels, ring_samples) {
  CISTERN_ASSERT(!fault_of_ring(ring_samples, config));
  // Only Extend fills a buffer further than the usual length.
  const bool extends = config.overlap == OverlapPolicy::Extend;
  const std::int64_t longest = extends ? config.max_samples : config.pre_samples + config.post_samples;
  buffers_.resize(static_cast<std::size_t>(config.buffers));
  for (Buffer& buffer : buffers_) buffer.codes.resize(channels, static_cast<std::size_t>(longest));
}

void CaptureUnit::store(std::span<const std::int16_t> codes) {
  const std::int64_t now = ring_.stored();
  ring_.store(codes);
  for (Buffer& buffer : buffers_) {
    if (buffer.capture && booked(buffer).free_at <= now) copy_out(buffer);
    if (buffer.capture && now < booked(buffer).end_sample) fill(buffer, codes);
  }
  busy_samples_ += is_busy() ? 1 : 0;
}

CaptureDecision CaptureUnit::fire() {
  CISTERN_ASSERT(ring_.stored() > 0);
  const CaptureDecision decision = book_.take(ring_.stored() - 1);
  if (decision.outcome == CaptureOutcome::Captured) open(*decision.capture);
  return decision;
}

void CaptureUnit::open(std::size_t capture) {
  Buffer& buffer = buffers_[static_cast<std::size_t>(book_.captures()[capture].buffer)];
  CISTERN_ASSERT(!buffer.capture);
  buffer.capture = capture;
  buffer.filled = ring_.stored() - booked(buffer).first_sample;
  ring_.copy_from(booked(buffer).first_sample, buffer.codes);
  ++occupied_;
}

void CaptureUnit::fill(Buffer& buffer, std::span<const std::int16_t> codes) {
  for (std::size_t c = 0; c < codes.size(); ++c) {
    buffer.codes.channel(c)[static_cast<std::size_t>(buffer.filled)] = codes[c];
  }
  ++buffer.filled;
}

void CaptureUnit::copy_out(Buffer& buffer) {
  StationCapture& capture = copied_out_.emplace_back();
  capture.span = booked(buffer);
  capture.complete = buffer.filled == capture.span.end_sample - capture.span.first_sample;
  capture.codes.resize(buffer.codes.channels(), static_cast<std::size_t>(buffer.filled));
  for (std::size_t c = 0; c < buffer.codes.channels(); ++c) {
    const auto from = buffer.codes.view().channel(c).first(static_cast<std::size_t>(buffer.filled));
    std::copy(from.begin(), from.end(), capture.codes.channel(c).begin());
  }
  buffer.capture.reset();
  --occupied_;
}

std::vector<StationCapture> CaptureUnit::finish() {
  for (Buffer& buffer : buffers_) {
    if (buffer.capture) copy_out(buffer);
  }
  std::sort(copied_out_.begin(), copied_out_.end(), [](const StationCapture& a, const StationCapture& b) {
    return a.span.firing_sample < b.span.firing_sample;
  });
  return std::exchange(copied_out_, {});
}

}  // namespace cistern
