#include "comms/messages/message_error.hpp"

namespace cistern {

std::string_view text_of(MessageError error) {
  switch (error) {
    case MessageError::Malformed: return "the bytes are not a whole message";
    case MessageError::MissingField: return "a required field is missing";
    case MessageError::OutOfRange: return "a field has an impossible value";
  }
  return "unknown";
}

}  // namespace cistern
