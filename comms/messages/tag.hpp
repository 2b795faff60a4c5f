#pragma once
/// \file
/// The tag: the short notice of a firing that a station sends to the central trigger.
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>

#include "comms/messages/message_error.hpp"
#include "traces/base/errors.hpp"
#include "traces/base/time.hpp"

namespace cistern {

struct Tag {
  std::uint32_t station_number{0};   ///< counted from 1
  std::uint32_t trigger_index{0};    ///< place in the station's list of triggers, from 0, below 65,535
  std::uint64_t capture_number{0};   ///< counted from 1 at each station; names the capture in a readout request
  GpsNanoseconds firing_time_ns{0};  ///< sampling instant of the firing's sample, >= 0
  std::optional<GpsNanoseconds>
      onset_time_ns;          ///< at most 4.2 s before the firing; empty where the trigger cannot tell
  float time_error_ns{0};     ///< one standard deviation of the clock, finite, >= 0
  bool start_unknown{false};  ///< the trigger's window reached before the first sample
  bool operator==(const Tag&) const = default;
};

/// Bytes of comms/messages/tag.proto. The same tag gives the same bytes. Bug if a field leaves its range.
[[nodiscard]] std::string encode(const Tag& tag);

/// The tag in `bytes`; fields that this version does not know are skipped. Finds bytes that are no tag and tags
/// that are impossible; a flipped bit that leaves a possible tag is for the frame check of the link to find.
[[nodiscard]] Result<Tag, MessageError> decode_tag(std::string_view bytes);

}  // namespace cistern
