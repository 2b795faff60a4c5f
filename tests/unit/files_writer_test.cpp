/// A file appears whole or not at all, and a disk that fails is the world's fault.
#include <fmt/format.h>
#include <gtest/gtest.h>
#include <hdf5.h>
#include <sys/resource.h>
#include <sys/wait.h>

#include <algorithm>
#include <array>
#include <csignal>

#include "tests/unit/files_support.hpp"

namespace cistern {
namespace {

constexpr std::array<const char*, 3> names{"t.csv", "t.npy", "t.h5"};

WholeFile some_file(std::size_t samples = 100) {
  RandomStream stream(7, Purpose::PropertyTest, 0);
  return random_file(4, 2, samples, 12, stream);
}

std::vector<std::string> files_in(const std::filesystem::path& folder) {
  std::vector<std::string> found;
  for (const auto& entry : std::filesystem::directory_iterator(folder))
    found.push_back(entry.path().filename().string());
  std::sort(found.begin(), found.end());
  return found;
}

TEST(TraceWriter, shows_the_file_only_when_it_is_finished) {
  const WholeFile file = some_file();
  for (const char* name : names) {
    const TraceFolder folder;
    const auto writer = create_trace_file(folder / name, file.info);
    for (std::size_t t = 0; t < 4; ++t) {
      writer->append({static_cast<std::int64_t>(t), 0, true, {}, file.traces[t].view()});
      EXPECT_EQ(files_in(folder.path()), std::vector<std::string>{fmt::format(".{}.part", name)});
    }
    writer->finish({});
    EXPECT_EQ(files_in(folder.path()), std::vector<std::string>{name});
  }
}

TEST(TraceWriter, leaves_nothing_and_the_old_file_as_it_was_when_it_is_dropped) {
  const WholeFile file = some_file();
  for (const char* name : names) {
    const TraceFolder folder;
    write_bytes(folder / name, "old");
    {
      const auto writer = create_trace_file(folder / name, file.info);
      writer->append({0, 0, true, {}, file.traces[0].view()});
    }
    EXPECT_EQ(files_in(folder.path()), std::vector<std::string>{name});
    EXPECT_EQ(bytes_of(folder / name), "old");
  }
}

TEST(TraceWriter, replaces_an_older_file) {
  const WholeFile file = some_file();
  for (const char* name : names) {
    const TraceFolder folder;
    write_bytes(folder / name, "old");
    write_whole(folder / name, file);
    EXPECT_TRUE(have_equal_codes(read_whole(folder / name), file));
  }
}

TEST(TraceWriter, refuses_truth_that_the_format_cannot_hold) {
  WholeFile file = some_file();
  file.truth = {{"size", "VEM", {1, 2, 3, 4}}};
  for (const char* name : {"t.csv", "t.npy"}) {
    const TraceFolder folder;
    EXPECT_THROW(write_whole(folder / name, file), InputError);
    EXPECT_TRUE(files_in(folder.path()).empty());
  }
}

TEST(TraceWriter, refuses_places_where_no_file_can_be) {
  const WholeFile file = some_file();
  const TraceFolder folder;
  std::filesystem::create_directory(folder / "d.csv");
  for (const char* name : {"none/t.csv", "t.txt", "t", "d.csv", ".csv"}) {
    EXPECT_THROW((void)create_trace_file(folder / name, file.info), InputError) << name;
  }
  const std::string long_name = std::string(300, 'x') + ".csv";
  EXPECT_THROW((void)create_trace_file(folder / long_name, file.info), InputError);
}

/// Every write beyond `bytes` fails, as on a full disk. A process of its own, since the limit is of a process.
/// \return 0: all was well; 1: SystemFault in one line that names the file; 2: anything else
int outcome_on_a_small_disk(const std::filesystem::path& path, const WholeFile& file, rlim_t bytes) {
  const pid_t child = fork();
  if (child == 0) {
    std::signal(SIGXFSZ, SIG_IGN);
    const rlimit limit{bytes, bytes};
    setrlimit(RLIMIT_FSIZE, &limit);
    int outcome = 0;
    try {
      write_whole(path, file);
    } catch (const SystemFault& fault) {
      const std::string what = fault.what();
      outcome = what.rfind(path.string(), 0) == 0 && what.find('\n') == std::string::npos ? 1 : 2;
    } catch (...) {
      outcome = 2;
    }
    std::exit(outcome);  // runs the libraries' own ends too
  }
  int status = 0;
  waitpid(child, &status, 0);
  return WIFEXITED(status) ? WEXITSTATUS(status) : 100 + status;
}

TEST(TraceWriter, a_full_disk_is_a_system_fault_wherever_it_strikes) {
  WholeFile file = some_file(5'000);
  for (const char* name : names) {
    const TraceFolder folder;
    file.truth.clear();
    if (format_of(name) == TraceFormat::Hdf5) file.truth = {{"size", "VEM", {1, 2, 3, 4}}};
    write_whole(folder / name, file);
    const auto size = std::filesystem::file_size(folder / name);
    std::filesystem::remove(folder / name);
    for (rlim_t bytes = 0; bytes < size; bytes += size / 9) {
      EXPECT_EQ(outcome_on_a_small_disk(folder / name, file, bytes), 1) << name << " after " << bytes << " bytes";
      EXPECT_TRUE(files_in(folder.path()).empty());
    }
    EXPECT_EQ(outcome_on_a_small_disk(folder / name, file, 2 * size), 0) << name;
  }
}

/// HDF5 notes when a dataset was made unless it is told not to; then no two runs give the same bytes.
TEST(TraceWriter, hdf5_holds_no_time_of_day) {
  WholeFile file = some_file();
  file.truth = {{"size", "VEM", {1, 2, 3, 4}}};
  for (auto& start : file.starts) start = 5;
  const TraceFolder folder;
  write_whole(folder / "t.h5", file);
  const hid_t id = H5Fopen((folder / "t.h5").c_str(), H5F_ACC_RDONLY, H5P_DEFAULT);
  for (const char* name : {"/codes", "/start_ns", "/truth/size"}) {
    H5O_info_t info{};
    ASSERT_GE(H5Oget_info_by_name2(id, name, &info, H5O_INFO_TIME, H5P_DEFAULT), 0) << name;
    EXPECT_EQ(info.mtime, 0) << name;
  }
  H5Fclose(id);
}

using TraceWriterDeathTest = testing::Test;

TEST(TraceWriterDeathTest, blocks_that_make_no_whole_traces_are_a_bug) {
  const TraceFolder folder;
  const WholeFile file = some_file();
  const auto codes = file.traces[0].view();
  const auto append = [&](const CodesView& view, bool is_last) {
    create_trace_file(folder / "t.npy", file.info)->append({0, 0, is_last, {}, view});
  };
  EXPECT_DEATH(append(codes.part(0, 99), true), "internal fault");
  EXPECT_DEATH(append(codes, false), "internal fault");
  EXPECT_DEATH(append(Codes(3, 100).view(), true), "internal fault");
  EXPECT_DEATH(create_trace_file(folder / "t.npy", file.info)->finish({}), "internal fault");
}

}  // namespace
}  // namespace cistern
