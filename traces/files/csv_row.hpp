#pragma once
/// \file
/// One data line of a CSV trace file. Internal to traces/files.
#include <array>
#include <cstdint>
#include <string>
#include <string_view>

namespace cistern {

struct CsvRow {
  std::int64_t trace{0};
  std::int64_t sample{0};
  std::array<std::int16_t, 16> codes{};
};

/// Reads "trace,sample,code,code,...". False when it is anything else or a code has more than `bits` bits.
[[nodiscard]] bool parse_csv_row(std::string_view line, std::size_t channels, std::int32_t bits, CsvRow& row);

/// InputError that says what is wrong with a line that parse_csv_row refused.
[[noreturn]] void refuse_csv_row(const std::string& place, std::string_view line, std::size_t channels,
                                 std::int32_t bits);

/// InputError for a code that needs more than `bits` bits.
[[noreturn]] void refuse_csv_code(const std::string& place, std::size_t channel, std::int64_t code, std::int32_t bits);

}  // namespace cistern
