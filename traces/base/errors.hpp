#pragma once
/// \file
/// Whose fault is it, and who can act? Bad input is an InputError, caught once at the command
/// line; a world that broke (disk full, lost worker) is a SystemFault; our own bugs assert, in
/// every build; expected outcomes are values of a Result.
#include <stdexcept>
#include <string>
#include <string_view>
#include <tl/expected.hpp>

namespace cistern {

/// The user's input or call is wrong. what() is one line: "PLACE: EXPECTATION".
class InputError : public std::runtime_error {
 public:
  /// \param place        file, line, key, trace: where to look. May be empty.
  /// \param expectation  what is wrong and what was expected, without a full stop.
  InputError(std::string place, std::string expectation);
  [[nodiscard]] const std::string& place() const noexcept { return place_; }
  [[nodiscard]] const std::string& expectation() const noexcept { return expectation_; }

 private:
  std::string place_;
  std::string expectation_;
};

/// The world broke: disk full, a worker lost, a database locked. what() is one line.
class SystemFault : public std::runtime_error {
 public:
  using std::runtime_error::runtime_error;
};

/// Reports a bug of ours and aborts.
[[noreturn]] void report_bug(std::string_view condition, std::string_view file, int line);

/// Either a value or a reason that the caller is expected to handle.
template <typename Value, typename Reason>
using Result = tl::expected<Value, Reason>;

}  // namespace cistern

/// Holds in every build; a failure is our bug, never the user's.
#define CISTERN_ASSERT(condition) \
  ((condition) ? static_cast<void>(0) : ::cistern::report_bug(#condition, __FILE__, __LINE__))
