/// Files larger than the memory allowed are read and written within it.
#include <gtest/gtest.h>

#include "tests/unit/files_memory_support.hpp"

namespace cistern {
namespace {

TEST(TraceMemory, is_measured_as_it_is) {
  if (!is_peak_meaningful) GTEST_SKIP() << "not with sanitizers";
  const auto take = [] {
    std::vector<char> memory(220 << 20, 'x');
    if (memory[memory.size() / 2] != 'x') throw SystemFault("no memory");
  };
  EXPECT_GT(peak_memory_mib(take), memory_allowed_mib);
}

TEST(TraceMemory, one_long_trace_of_npy_takes_little) {
  const TraceFolder folder;
  make_sparse_npy(folder / "t.npy", 1, 4, 150'000'000);  // 1.2 GB
  expect_little_memory("read", [&] { read_through(folder / "t.npy", 150'000'000); });
}

TEST(TraceMemory, a_block_without_bound_takes_little) {
  const TraceFolder folder;
  make_sparse_npy(folder / "t.npy", 1, 1, 200'000'000);
  expect_little_memory("read", [&] { read_through(folder / "t.npy", 200'000'000, SIZE_MAX); });
}

TEST(TraceMemory, many_short_traces_of_npy_take_little) {
  const TraceFolder folder;
  make_sparse_npy(folder / "t.npy", 3'000'000, 2, 100);
  expect_little_memory("read", [&] { read_through(folder / "t.npy", 300'000'000); });
}

TEST(TraceMemory, hdf5_takes_little_when_written_and_when_read) {
  const TraceFolder folder;
  expect_little_memory("write one long trace", [&] { write_zeros(folder / "long.h5", 1, 4, 30'000'000); });
  expect_little_memory("read it", [&] { read_through(folder / "long.h5", 30'000'000); });
}

}  // namespace
}  // namespace cistern
