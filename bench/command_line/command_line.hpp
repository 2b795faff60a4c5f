#pragma once
/// \file
/// The program's surface: commands, options, messages and exit statuses.
#include <string>
#include <vector>

namespace cistern {

/// 0 done and all requirements met; 1 done, a requirement not met or undecided; 2 the input or the
/// call is wrong; 3 an internal or system fault; 130 stopped by the user.
enum class ExitStatus : int { Met = 0, NotMet = 1, WrongInput = 2, Fault = 3, Stopped = 130 };

/// \param arguments  without the program's name
[[nodiscard]] ExitStatus run_command_line(const std::vector<std::string>& arguments);

}  // namespace cistern
