#include "tests/cosim/own_process.hpp"

#include <gtest/gtest.h>
#include <sys/wait.h>
#include <unistd.h>

#include <cstdio>
#include <exception>
#include <iostream>

namespace cistern {
namespace {

[[noreturn]] void run_and_exit(const std::function<void()>& body) {
  try {
    body();
  } catch (const std::exception& error) {
    ADD_FAILURE() << "exception: " << error.what();
  }
  std::cout.flush();
  std::fflush(nullptr);
  _exit(testing::Test::HasFailure() ? 1 : 0);
}

}  // namespace

void in_own_process(const std::function<void()>& body) {
  std::cout.flush();
  std::fflush(nullptr);
  const pid_t child = fork();
  ASSERT_GE(child, 0);
  if (child == 0) run_and_exit(body);
  int status = 0;
  ASSERT_EQ(waitpid(child, &status, 0), child);
  EXPECT_TRUE(WIFEXITED(status) && WEXITSTATUS(status) == 0) << "the child process failed, see above";
}

}  // namespace cistern
