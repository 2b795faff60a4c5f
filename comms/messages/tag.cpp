#include "comms/messages/tag.hpp"

#include <cmath>
#include <limits>

#include "tag.pb.h"

namespace cistern {
namespace {

constexpr std::uint32_t most_triggers = 65'535;

bool is_possible(const Tag& tag) {
  constexpr std::int64_t longest_onset_ns = std::numeric_limits<std::uint32_t>::max();
  if (tag.station_number == 0 || tag.trigger_index >= most_triggers || tag.capture_number == 0) return false;
  if (tag.firing_time_ns < 0 || !std::isfinite(tag.time_error_ns) || tag.time_error_ns < 0) return false;
  if (!tag.onset_time_ns) return true;
  // The firing is not negative, so the subtraction below cannot overflow once the onset is in order.
  return *tag.onset_time_ns <= tag.firing_time_ns && *tag.onset_time_ns >= tag.firing_time_ns - longest_onset_ns;
}

bool has_required_fields(const wire::Tag& message) {
  return message.station_number() != 0 && message.trigger_number() != 0 && message.capture_number() != 0 &&
         message.has_time_error_ns() && message.has_firing_time_ns();
}

/// \param message  with all required fields, a firing time >= 0
Tag tag_of(const wire::Tag& message) {
  Tag tag;
  tag.station_number = message.station_number();
  tag.trigger_index = message.trigger_number() - 1;
  tag.capture_number = message.capture_number();
  tag.firing_time_ns = message.firing_time_ns();
  if (message.has_onset_to_firing_ns()) tag.onset_time_ns = tag.firing_time_ns - message.onset_to_firing_ns();
  tag.time_error_ns = message.time_error_ns();
  tag.start_unknown = message.start_unknown();
  return tag;
}

}  // namespace

std::string encode(const Tag& tag) {
  CISTERN_ASSERT(is_possible(tag));
  wire::Tag message;
  message.set_station_number(tag.station_number);
  message.set_trigger_number(tag.trigger_index + 1);
  message.set_capture_number(tag.capture_number);
  message.set_start_unknown(tag.start_unknown);
  if (tag.onset_time_ns) {
    message.set_onset_to_firing_ns(static_cast<std::uint32_t>(tag.firing_time_ns - *tag.onset_time_ns));
  }
  message.set_time_error_ns(tag.time_error_ns);
  message.set_firing_time_ns(tag.firing_time_ns);
  return message.SerializeAsString();
}

Result<Tag, MessageError> decode_tag(std::string_view bytes) {
  if (bytes.size() > static_cast<std::size_t>(std::numeric_limits<int>::max())) {
    return tl::make_unexpected(MessageError::Malformed);
  }
  wire::Tag message;
  if (!message.ParseFromArray(bytes.data(), static_cast<int>(bytes.size()))) {
    return tl::make_unexpected(MessageError::Malformed);
  }
  if (!has_required_fields(message)) return tl::make_unexpected(MessageError::MissingField);
  if (message.firing_time_ns() < 0) return tl::make_unexpected(MessageError::OutOfRange);
  const Tag tag = tag_of(message);
  if (!is_possible(tag)) return tl::make_unexpected(MessageError::OutOfRange);
  return tag;
}

}  // namespace cistern
