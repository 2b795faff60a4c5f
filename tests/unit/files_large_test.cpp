/// Files of many gigabytes, and those that take long to write, are read and written in little memory.
#include <gtest/gtest.h>

#include "tests/unit/files_memory_support.hpp"

namespace cistern {
namespace {

TEST(LargeTraceFiles, ten_gigabytes_of_npy_take_little) {
  const TraceFolder folder;
  make_sparse_npy(folder / "t.npy", 1, 4, 1'250'000'000);
  expect_little_memory("one trace", [&] { read_through(folder / "t.npy", 1'250'000'000); });
}

TEST(LargeTraceFiles, millions_of_hdf5_traces_with_starts_take_little) {
  const TraceFolder folder;
  expect_little_memory("write", [&] { write_zeros(folder / "t.h5", 10'000'000, 1, 8); });
  expect_little_memory("read", [&] { read_through(folder / "t.h5", 80'000'000); });
}

TEST(LargeTraceFiles, csv_takes_little_when_written_and_when_read) {
  const TraceFolder folder;
  expect_little_memory("write one long trace", [&] { write_zeros(folder / "t.csv", 1, 4, 15'000'000); });
  ASSERT_GT(std::filesystem::file_size(folder / "t.csv"), 250'000'000U);
  expect_little_memory("read it", [&] { read_through(folder / "t.csv", 15'000'000); });
}

}  // namespace
}  // namespace cistern
