/// \file
/// The SystemC library brings a `main` of its own, which the linker may prefer to that of GoogleTest's library.
#include <gtest/gtest.h>

int main(int count, char** arguments) {
  testing::InitGoogleTest(&count, arguments);
  return RUN_ALL_TESTS();
}
