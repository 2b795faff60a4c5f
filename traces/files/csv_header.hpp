#pragma once
/// \file
/// The comment and header lines of a CSV trace file. Internal to traces/files.
#include <string>
#include <string_view>

#include "traces/files/trace_file.hpp"

namespace cistern {

/// Reads `key=value` words of a line that starts with '#'; a comment without '=' is free text.
/// \param place  "FILE:LINE"  \param seen  keys so far, for repeated ones
void read_csv_comment(const std::string& place, std::string_view line, TraceFileInfo& info, std::string& seen);

/// The number of channels of "trace,sample,ch0,ch1,..."; InputError for any other header.
[[nodiscard]] std::size_t read_csv_columns(const std::string& place, std::string_view line);

/// The comment lines that say all that `info` holds, and the header.
[[nodiscard]] std::string csv_head(const TraceFileInfo& info);

}  // namespace cistern
