#pragma once
/// \file
/// The comment and header lines of a CSV trace file. Internal to traces/files.
#include <string>
#include <string_view>
#include <vector>

#include "traces/files/trace_file.hpp"

namespace cistern {

/// Reads a line that starts with '#'. Without a '=' it is free text; with one, all its words are
/// `key=value`, so that a list with blanks in it is refused rather than cut short.
/// \param place  "FILE:LINE"
/// \param info   a list of baselines is taken as it stands, checked once the channels are known
/// \param seen   the keys so far; one that comes again is refused
void read_csv_comment(const std::string& place, std::string_view line, TraceFileInfo& info,
                      std::vector<std::string>& seen);

/// The number of channels of "trace,sample,ch0,ch1,..."; InputError for any other header.
[[nodiscard]] std::size_t read_csv_columns(const std::string& place, std::string_view line);

/// The comment lines that say all that `info` holds, and the header.
[[nodiscard]] std::string csv_head(const TraceFileInfo& info);

}  // namespace cistern
