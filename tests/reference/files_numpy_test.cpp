/// Trace files against NumPy and h5py: each side reads what the other has written.
#include <fmt/format.h>
#include <gtest/gtest.h>

#include <cstdlib>

#include "tests/unit/files_support.hpp"

namespace cistern {
namespace {

constexpr std::size_t traces = 5;
constexpr std::size_t channels = 3;
constexpr std::size_t samples = 1'000;

void ask_python(const char* what, const TraceFolder& folder) {
  const std::string command =
      fmt::format("{} -B {} {} {}", CISTERN_NUMPY_PYTHON, CISTERN_FILES_NUMPY_CHECK, what, folder.path().string());
  ASSERT_EQ(std::system(command.c_str()), 0) << command;
}

/// The codes that Python has drawn, as it has listed them.
std::vector<Codes> listed_codes(const TraceFolder& folder) {
  std::ifstream list(folder / "codes.txt");
  std::vector<Codes> codes(traces, Codes(channels, samples));
  for (Codes& trace : codes) {
    for (std::size_t c = 0; c < channels; ++c) {
      for (std::int16_t& code : trace.channel(c)) list >> code;
    }
  }
  if (!list) throw SystemFault("Python lists too few codes");
  return codes;
}

/// The same as in files_numpy_check.py.
WholeFile expected_file(const TraceFolder& folder) {
  WholeFile file;
  file.traces = listed_codes(folder);
  file.starts = {1'450'000'000'123'456'789, -1, 0, 5, INT64_MAX};
  file.truth = {{"size", "VEM", {0.1, 2.0, -3.0, 1e300, 5.0}}};
  file.info.traces = traces;
  file.info.channels = channels;
  file.info.samples = samples;
  file.info.sample_rate_mhz = 100.1;
  file.info.bits = 12;
  file.info.live_time_s = 0.1 + 0.2;
  file.info.selection = "triggered_by:long";
  file.info.contiguous = true;
  file.info.baseline_counts = {212, 198, 205};
  file.info.height_counts_per_vem = {140.25, 138.0, 143.5};
  file.info.area_counts_per_vem = {1020.5, 1000.0, 1040.0};
  return file;
}

TEST(FilesOfNumpy, are_read_with_the_same_values) {
  const TraceFolder folder;
  ask_python("write", folder);
  const WholeFile expected = expected_file(folder);
  for (const char* name : {"int16.npy", "uint16.npy", "savetxt.csv", "int16.h5", "uint16.h5", "big_endian.h5"}) {
    EXPECT_TRUE(have_equal_codes(read_whole(folder / name, 300), expected)) << name;
  }
}

TEST(FilesOfNumpy, tell_all_that_attributes_and_columns_say) {
  const TraceFolder folder;
  ask_python("write", folder);
  const WholeFile expected = expected_file(folder);
  for (const char* name : {"int16.h5", "uint16.h5", "big_endian.h5"}) {
    const WholeFile file = read_whole(folder / name);
    EXPECT_EQ(file.info.sample_rate_mhz, expected.info.sample_rate_mhz) << name;
    EXPECT_EQ(file.info.bits, expected.info.bits);
    EXPECT_EQ(file.info.live_time_s, expected.info.live_time_s);
    EXPECT_EQ(file.info.selection, expected.info.selection);
    EXPECT_EQ(file.info.contiguous, expected.info.contiguous);
    EXPECT_EQ(file.info.baseline_counts, expected.info.baseline_counts);
    EXPECT_EQ(file.info.height_counts_per_vem, expected.info.height_counts_per_vem);
    EXPECT_EQ(file.info.area_counts_per_vem, expected.info.area_counts_per_vem);
    EXPECT_EQ(file.starts, expected.starts);
    ASSERT_EQ(file.truth.size(), 1U);
    EXPECT_EQ(file.truth[0].values, expected.truth[0].values);
    EXPECT_EQ(file.truth[0].unit, "VEM");
  }
}

TEST(FilesOfNumpy, of_other_types_and_orders_are_refused) {
  const TraceFolder folder;
  ask_python("write", folder);
  struct Row {
    const char* name;
    const char* says;
  };
  for (const auto& [name, says] : {Row{"bad_big_endian.npy", "big-endian"},
                                   {"bad_int32.npy", "'<i4'"},
                                   {"bad_fortran_order.npy", "fortran_order"},
                                   {"bad_rank.npy", "(3, 1000)"},
                                   {"bad_uint16.npy", "trace 4, channel 2, sample 999: code is 32768"}}) {
    expect_refusal(fault_of_reading(folder / name), {name, says});
  }
}

TEST(FilesOfOurs, are_read_by_numpy_with_the_same_values) {
  const TraceFolder folder;
  ask_python("write", folder);
  WholeFile file = expected_file(folder);
  write_whole(folder / "cistern.h5", file, 300);
  file.truth.clear();
  write_whole(folder / "cistern.npy", file, 300);
  write_whole(folder / "cistern.csv", file, 300);
  ask_python("read", folder);
}

}  // namespace
}  // namespace cistern
