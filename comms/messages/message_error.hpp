#pragma once
/// \file
/// Why received bytes are not taken for a message.
#include <string_view>

namespace cistern {

enum class MessageError {
  Malformed = 1,  ///< not Protocol Buffers at all, cut short, or a field of the wrong type
  MissingField,   ///< a field without which the message says nothing
  OutOfRange,     ///< a field with a value that cannot be
};

/// One short sentence, without a full stop.
[[nodiscard]] std::string_view text_of(MessageError error);

}  // namespace cistern
