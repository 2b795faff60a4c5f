#pragma once
/// \file
/// Foreign text in messages: always on one line, never able to steer a terminal. Internal to bench/scenario.
#include <cstddef>
#include <string>
#include <string_view>

namespace cistern {

/// Control characters, line separators and bytes that are not UTF-8 are written as escapes.
[[nodiscard]] std::string one_line(std::string_view text);

/// At most `bytes_max` bytes of UTF-8, cut between characters; "..." shows that something is missing.
[[nodiscard]] std::string shortened(std::string text, std::size_t bytes_max);

}  // namespace cistern
