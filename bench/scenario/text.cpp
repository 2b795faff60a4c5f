/// \file
/// UTF-8 is decoded only as far as needed: its length bits, its continuation bytes, and the few code
/// points that break a line or steer a terminal (Unicode, C0, C1 and line separators).
#include "bench/scenario/text.hpp"

#include <fmt/format.h>

#include <cstdint>

namespace cistern {
namespace {

struct Character {
  std::size_t bytes{1};
  std::uint32_t code_point{0};
  bool valid{false};
};

bool is_continuation(char c) { return (static_cast<unsigned char>(c) & 0xC0U) == 0x80U; }

Character first_character(std::string_view text) {
  const auto lead = static_cast<unsigned char>(text.front());
  if (lead < 0x80U) return {1, lead, true};
  const std::size_t bytes = lead >= 0xF0U ? 4 : lead >= 0xE0U ? 3 : 2;
  if (lead < 0xC2U || lead > 0xF4U || text.size() < bytes) return {1, lead, false};
  std::uint32_t code_point = lead & (0x7FU >> bytes);
  for (std::size_t i = 1; i < bytes; ++i) {
    if (!is_continuation(text[i])) return {1, lead, false};
    code_point = code_point << 6U | (static_cast<unsigned char>(text[i]) & 0x3FU);
  }
  return {bytes, code_point, true};
}

bool breaks_or_steers(std::uint32_t code_point) {
  const bool is_control = code_point < 0x20 || (code_point >= 0x7F && code_point < 0xA0);
  const bool is_separator = code_point == 0x2028 || code_point == 0x2029;
  const bool turns_direction =
      (code_point >= 0x202A && code_point <= 0x202E) || (code_point >= 0x2066 && code_point <= 0x2069);
  return is_control || is_separator || turns_direction;
}

std::string escape_of(std::uint32_t code_point) {
  switch (code_point) {
    case '\n': return "\\n";
    case '\r': return "\\r";
    case '\t': return "\\t";
    default: return fmt::format("\\u{:04X}", code_point);
  }
}

}  // namespace

std::string one_line(std::string_view text) {
  std::string line;
  while (!text.empty()) {
    const Character next = first_character(text);
    if (!next.valid) {
      line += fmt::format("\\x{:02X}", next.code_point);
    } else if (breaks_or_steers(next.code_point)) {
      line += escape_of(next.code_point);
    } else {
      line += text.substr(0, next.bytes);
    }
    text.remove_prefix(next.bytes);
  }
  return line;
}

std::string shortened(std::string text, std::size_t bytes_max) {
  if (text.size() <= bytes_max) return text;
  std::size_t end = bytes_max;
  while (end > 0 && is_continuation(text[end])) --end;
  text.resize(end);
  return text + "...";
}

}  // namespace cistern
