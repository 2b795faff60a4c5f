#include "traces/base/errors.hpp"

#include <cstdio>
#include <cstdlib>
#include <utility>

namespace cistern {
namespace {
std::string one_line(const std::string& place, const std::string& expectation) {
  return place.empty() ? expectation : place + ": " + expectation;
}
}  // namespace

InputError::InputError(std::string place, std::string expectation)
    : std::runtime_error(one_line(place, expectation)),
      place_(std::move(place)),
      expectation_(std::move(expectation)) {}

void report_bug(std::string_view condition, std::string_view file, int line) {
  std::fprintf(stderr, "cistern: internal fault: %.*s:%d: %.*s does not hold\n", static_cast<int>(file.size()),
               file.data(), line, static_cast<int>(condition.size()), condition.data());
  std::abort();
}

}  // namespace cistern
