#pragma once
/// \file
/// Text made safe for HTML and for a script element. Internal to the report.
#include <optional>
#include <string>
#include <string_view>

namespace cistern {

/// & < > " ' and control characters escaped; for text and for attribute values in quotes.
[[nodiscard]] std::string html_text(std::string_view text);

/// JSON that may stand inside <script>: no '<', and none of the line ends that end a script's line.
[[nodiscard]] std::string script_json(std::string json);

/// A heading as an id: lower-case letters, digits and dashes.
[[nodiscard]] std::string anchor_of(std::string_view heading);

/// Four significant digits; "-" for what is absent or not finite.
[[nodiscard]] std::string number_or_dash(const std::optional<double>& value);

}  // namespace cistern
