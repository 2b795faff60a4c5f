#include "traces/files/csv_row.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <charconv>

#include "traces/base/errors.hpp"
#include "traces/files/file_facts.hpp"

namespace cistern {
namespace {

std::string name_of_field(std::size_t field) {
  if (field == 0) return "trace";
  return field == 1 ? "sample" : fmt::format("ch{}", field - 2);
}

void check_field(const std::string& place, std::size_t field, std::string_view text, std::int32_t bits) {
  std::int64_t value = 0;
  const auto [end, error] = std::from_chars(text.data(), text.data() + text.size(), value);
  if (error != std::errc{} || end != text.data() + text.size()) {
    throw InputError(place, fmt::format("{} is {}, expected a whole number", name_of_field(field), in_quotes(text)));
  }
  if (field >= 2 && (value < 0 || value >= (std::int64_t{1} << bits))) refuse_csv_code(place, field - 2, value, bits);
}

}  // namespace

bool parse_csv_row(std::string_view line, std::size_t channels, std::int32_t bits, CsvRow& row) {
  const char* at = line.data();
  const char* const end = at + line.size();
  const auto take_number = [&](auto& value, bool is_last) {
    const auto [next, error] = std::from_chars(at, end, value);
    if (error != std::errc{} || (is_last ? next != end : next == end || *next != ',')) return false;
    at = is_last ? next : next + 1;
    return true;
  };
  if (!take_number(row.trace, false) || !take_number(row.sample, false)) return false;
  const std::int32_t beyond = 1 << bits;
  for (std::size_t c = 0; c < channels; ++c) {
    std::int32_t code = 0;
    if (!take_number(code, c + 1 == channels) || code < 0 || code >= beyond) return false;
    row.codes[c] = static_cast<std::int16_t>(code);
  }
  return true;
}

void refuse_csv_row(const std::string& place, std::string_view line, std::size_t channels, std::int32_t bits) {
  if (line.find('\0') != std::string_view::npos) throw InputError(place, "holds a NUL byte, expected text");
  if (line.empty()) throw InputError(place, fmt::format("is an empty line, expected {} whole numbers", channels + 2));
  if (line.front() == '#') throw InputError(place, "is a comment among the samples, expected it before the header");
  const auto fields = static_cast<std::size_t>(std::count(line.begin(), line.end(), ',')) + 1;
  if (fields != channels + 2) {
    throw InputError(place, fmt::format("has {} fields, expected {} (trace,sample,ch0 to ch{})", fields, channels + 2,
                                        channels - 1));
  }
  for (std::size_t field = 0; field < fields; ++field) {
    const std::size_t comma = std::min(line.find(','), line.size());
    check_field(place, field, line.substr(0, comma), bits);
    line.remove_prefix(std::min(comma + 1, line.size()));
  }
  report_bug("a refused row has a fault", __FILE__, __LINE__);
}

void refuse_csv_code(const std::string& place, std::size_t channel, std::int64_t code, std::int32_t bits) {
  throw InputError(place, fmt::format("ch{} is {}, expected 0 to {} ({} bits)", channel, code, (1 << bits) - 1, bits));
}

}  // namespace cistern
