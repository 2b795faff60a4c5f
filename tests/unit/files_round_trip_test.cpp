/// What is written is read again, in every format, however it is cut.
#include <fmt/format.h>
#include <gtest/gtest.h>

#include <array>
#include <utility>

#include "tests/unit/files_support.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t seed = 20'261'201;
constexpr std::array<const char*, 4> names{"t.csv", "t.npy", "t.h5", "t.HDF5"};

RandomStream stream_of(std::uint64_t number) { return {seed, Purpose::PropertyTest, number}; }

/// Shapes on both sides of what readers and writers handle at once (chunks of 16,384, slabs of 524,288 codes).
struct Shape {
  std::size_t traces, channels, samples;
};
constexpr std::array<Shape, 10> shapes{{{1, 1, 1},
                                        {1, 16, 3},
                                        {5, 4, 100},
                                        {3, 2, 16'383},
                                        {2, 2, 16'384},
                                        {2, 3, 16'385},
                                        {2, 16, 33'000},
                                        {700, 1, 1},
                                        {20'000, 1, 7},
                                        {2, 1, 600'000}}};

WholeFile full_file(std::uint64_t number) {
  RandomStream stream = stream_of(number);
  WholeFile file = random_file(3, 2, 40, 12, stream);
  file.info.sample_rate_mhz = 100.1;
  file.info.bits = 12;
  file.info.baseline_counts = {212, 0};
  file.info.height_counts_per_vem = {140.25, 1e-3};
  file.info.area_counts_per_vem = {1020.5, 999};
  file.info.selection = "triggered_by:long";
  file.info.live_time_s = 0.1 + 0.2;
  file.info.contiguous = true;
  file.starts = {1'450'000'000'123'456'789, -1, INT64_MAX};
  file.truth = {{"arrival", "ns", {-1.5, 0, 1e300}}, {"size", "VEM", {0.1, 2, 3}}};
  return file;
}

TEST(TraceFiles, every_format_gives_back_the_codes_of_every_shape) {
  for (std::size_t i = 0; i < shapes.size(); ++i) {
    const auto [traces, channels, samples] = shapes[i];
    RandomStream stream = stream_of(i);
    const WholeFile file = random_file(traces, channels, samples, 15, stream);
    const TraceFolder folder;
    for (const char* name : names) {
      SCOPED_TRACE(fmt::format("seed {}, shape {} of {}", seed, i, name));
      write_whole(folder / name, file, 1 + below(stream, 2 * samples));
      const WholeFile back = read_whole(folder / name, 1 + below(stream, 2 * samples));
      EXPECT_EQ(back.info.channels, channels);
      EXPECT_EQ(back.info.samples, samples);
      EXPECT_TRUE(have_equal_codes(file, back));
    }
  }
}

TEST(TraceFiles, how_blocks_are_cut_changes_neither_what_is_written_nor_what_is_read) {
  RandomStream stream = stream_of(100);
  const WholeFile file = random_file(3, 3, 20'000, 12, stream);
  const TraceFolder folder;
  for (const char* name : names) {
    write_whole(folder / name, file);
    const std::string bytes = bytes_of(folder / name);
    for (const std::size_t cut : {999U, 16'384U, 16'385U}) {
      SCOPED_TRACE(fmt::format("{} in blocks of {}", name, cut));
      write_whole(folder / name, file, cut);
      EXPECT_TRUE(bytes_of(folder / name) == bytes);
      EXPECT_TRUE(have_equal_codes(read_whole(folder / name, cut), file));
    }
  }
}

TEST(TraceFiles, one_sample_at_a_time_is_enough) {
  RandomStream stream = stream_of(101);
  const WholeFile file = random_file(2, 2, 50, 12, stream);
  const TraceFolder folder;
  for (const char* name : names) {
    write_whole(folder / name, file, 1);
    EXPECT_TRUE(have_equal_codes(read_whole(folder / name, 1), file)) << name;
  }
}

TEST(TraceFiles, codes_survive_the_way_through_all_formats) {
  RandomStream stream = stream_of(102);
  WholeFile file = random_file(7, 5, 333, 15, stream);
  const TraceFolder folder;
  write_whole(folder / "a.csv", file);
  for (const auto& [from, to] : {std::pair{"a.csv", "b.h5"}, {"b.h5", "c.npy"}, {"c.npy", "d.csv"}}) {
    WholeFile next = read_whole(folder / from);
    next.info.traces = static_cast<std::int64_t>(next.traces.size());
    write_whole(folder / to, next);
  }
  EXPECT_EQ(bytes_of(folder / "a.csv"), bytes_of(folder / "d.csv"));
  EXPECT_TRUE(have_equal_codes(file, read_whole(folder / "d.csv")));
}

TEST(TraceFiles, hdf5_keeps_all_that_is_known) {
  const WholeFile file = full_file(103);
  const TraceFolder folder;
  write_whole(folder / "t.h5", file);
  const WholeFile back = read_whole(folder / "t.h5");
  EXPECT_EQ(back.info.traces, 3);
  EXPECT_EQ(back.info.sample_rate_mhz, file.info.sample_rate_mhz);
  EXPECT_EQ(back.info.bits, file.info.bits);
  EXPECT_EQ(back.info.baseline_counts, file.info.baseline_counts);
  EXPECT_EQ(back.info.height_counts_per_vem, file.info.height_counts_per_vem);
  EXPECT_EQ(back.info.area_counts_per_vem, file.info.area_counts_per_vem);
  EXPECT_EQ(back.info.selection, file.info.selection);
  EXPECT_EQ(back.info.live_time_s, file.info.live_time_s);
  EXPECT_TRUE(back.info.contiguous);
  EXPECT_EQ(back.starts, file.starts);
  ASSERT_EQ(back.truth.size(), 2U);
  for (std::size_t i = 0; i < 2; ++i) {
    EXPECT_EQ(back.truth[i].name, file.truth[i].name);
    EXPECT_EQ(back.truth[i].unit, file.truth[i].unit);
    EXPECT_EQ(back.truth[i].values, file.truth[i].values);
  }
}

TEST(TraceFiles, csv_keeps_what_its_comments_can_say) {
  WholeFile file = full_file(104);
  file.truth.clear();
  const TraceFolder folder;
  write_whole(folder / "t.csv", file);
  const TraceFileInfo back = read_whole(folder / "t.csv").info;
  EXPECT_EQ(back.sample_rate_mhz, file.info.sample_rate_mhz);
  EXPECT_EQ(back.bits, file.info.bits);
  EXPECT_EQ(back.baseline_counts, file.info.baseline_counts);
  EXPECT_EQ(back.selection, file.info.selection);
  EXPECT_EQ(back.live_time_s, file.info.live_time_s);
  EXPECT_TRUE(back.contiguous);
  EXPECT_FALSE(back.traces);
}

TEST(TraceFiles, a_file_that_says_nothing_says_nothing_back) {
  RandomStream stream = stream_of(105);
  const WholeFile file = random_file(1, 1, 5, 12, stream);
  const TraceFolder folder;
  for (const char* name : names) {
    write_whole(folder / name, file);
    const WholeFile back = read_whole(folder / name);
    EXPECT_FALSE(back.info.sample_rate_mhz || back.info.bits || back.info.baseline_counts || back.info.selection ||
                 back.info.live_time_s || back.info.contiguous || back.info.height_counts_per_vem ||
                 back.info.area_counts_per_vem)
        << name;
    EXPECT_FALSE(back.starts.front());
    EXPECT_TRUE(back.truth.empty());
  }
}

TEST(TraceFiles, starts_are_kept_only_when_every_trace_has_one) {
  RandomStream stream = stream_of(106);
  const TraceFolder folder;
  for (const std::size_t without : {0U, 1U, 8'191U, 8'192U, 19'999U}) {  // starts are kept in pieces of 8,192
    WholeFile file = random_file(20'000, 1, 2, 4, stream);
    for (std::size_t t = 0; t < file.starts.size(); ++t) file.starts[t] = static_cast<std::int64_t>(t) * 1'000;
    write_whole(folder / "all.h5", file);
    EXPECT_EQ(read_whole(folder / "all.h5").starts, file.starts);
    file.starts[without].reset();
    write_whole(folder / "some.h5", file);
    for (const auto& start : read_whole(folder / "some.h5").starts) ASSERT_FALSE(start) << without;
  }
}

}  // namespace
}  // namespace cistern
