#include <string>
#include <vector>

#include "bench/command_line/command_line.hpp"

int main(int argc, char** argv) {
  const std::vector<std::string> arguments(argv + 1, argv + argc);
  return static_cast<int>(cistern::run_command_line(arguments));
}
