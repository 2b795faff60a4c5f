/// \file
/// Mutated trace files are read or refused as bad input, in one line; nothing else happens.
/// CISTERN_FUZZ_SEED=N repeats a run or tries another, CISTERN_FUZZ_MUTANTS=N sets how many per format.
#include <fmt/core.h>

#include <array>
#include <cstdlib>

#include "tests/unit/files_support.hpp"

/// Read by the leak sanitizer: HDF5 loses memory of its own when it gives up on a damaged file.
extern "C" const char* __lsan_default_suppressions() { return "leak:libhdf5"; }

namespace cistern {
namespace {

std::uint64_t number_from_environment(const char* name, std::uint64_t otherwise) {
  const char* text = std::getenv(name);
  return text == nullptr ? otherwise : std::strtoull(text, nullptr, 10);
}

std::uint64_t seed() { return number_from_environment("CISTERN_FUZZ_SEED", 31'337); }

/// A small file that says all its format can say.
std::string good_file(const std::filesystem::path& path) {
  RandomStream stream(seed(), Purpose::PropertyTest, 1ULL << 40U);
  WholeFile file = random_file(3, 2, 5, 10, stream);
  file.info.sample_rate_mhz = 100;
  file.info.bits = 12;
  file.info.baseline_counts = {212, 198};
  file.info.selection = "triggered_by:long";
  file.info.live_time_s = 1.5;
  file.info.contiguous = true;
  if (format_of(path) == TraceFormat::Hdf5) {
    file.info.height_counts_per_vem = {140, 138};
    file.starts = {5, 6, 7};
    file.truth = {{"size", "VEM", {1, 2, 3}}};
  }
  write_whole(path, file);
  return bytes_of(path);
}

/// What tends to upset readers.
constexpr std::array<std::string_view, 24> fragments{"-1",
                                                     "0",
                                                     "32768",
                                                     "65536",
                                                     "99999999999999999999",
                                                     "1e999",
                                                     "nan",
                                                     ",",
                                                     ",,",
                                                     "\n",
                                                     "\r\n",
                                                     "\r",
                                                     "#",
                                                     "# bits=",
                                                     "=",
                                                     "'",
                                                     "(",
                                                     ")",
                                                     "}",
                                                     "'<u2'",
                                                     "True",
                                                     std::string_view("\0\0\0\0\0\0\0\0", 8),
                                                     "\xff\xff\xff\xff\xff\xff\xff\xff",
                                                     "\x1b[2J"};

std::string mutate(std::string bytes, RandomStream& stream) {
  const std::size_t at = below(stream, bytes.size());
  const std::string_view fragment = fragments[below(stream, fragments.size())];
  switch (below(stream, 8)) {
    case 0: return bytes.substr(0, at);
    case 1: return bytes.erase(at, 1 + below(stream, 12));
    case 2: return bytes.insert(at, fragment);
    case 3: return bytes.replace(at, fragment.size(), fragment);
    case 4: return bytes.insert(at, bytes.substr(below(stream, bytes.size()), 1 + below(stream, 40)));
    case 5: bytes[at] = static_cast<char>(below(stream, 256)); return bytes;
    default: bytes[at] = static_cast<char>(bytes[at] ^ (1 << below(stream, 8))); return bytes;
  }
}

std::string mutant_of(const std::string& good, std::uint64_t number) {
  RandomStream stream(seed(), Purpose::PropertyTest, number);
  std::string bytes = good;
  for (std::size_t changes = 1 + below(stream, 4); changes > 0 && !bytes.empty(); --changes)
    bytes = mutate(bytes, stream);
  return bytes;
}

enum class Outcome { Read, Refused, Wrong };

bool is_one_plain_line(const std::string& what) {
  return std::all_of(what.begin(), what.end(), [](char c) { return c >= 0x20 && c < 0x7F; });
}

/// Reads at most so many blocks: a mutant may claim any number of traces.
Outcome try_to_read(const std::filesystem::path& path) {
  try {
    const auto reader = open_trace_file(path);
    TraceBlock block;
    for (int blocks = 0; blocks < 64 && reader->next(1'000, block); ++blocks) {
      if (block.codes.channels() != reader->info().channels || block.codes.samples() == 0) return Outcome::Wrong;
    }
    if (format_of(path) == TraceFormat::Hdf5) (void)read_truth(path);
    return Outcome::Read;
  } catch (const InputError& error) {
    return is_one_plain_line(error.what()) ? Outcome::Refused : Outcome::Wrong;
  } catch (const SystemFault& fault) {
    return is_one_plain_line(fault.what()) ? Outcome::Refused : Outcome::Wrong;
  }
}

struct Outcomes {
  std::uint64_t read{0};
  std::uint64_t refused{0};
};

void fuzz(const char* name, std::uint64_t mutants) {
  mutants = number_from_environment("CISTERN_FUZZ_MUTANTS", mutants);
  fmt::print("{}: seed {}, {} mutants\n", name, seed(), mutants);
  const TraceFolder folder;
  const std::string good = good_file(folder / name);
  ASSERT_EQ(try_to_read(folder / name), Outcome::Read);
  Outcomes outcomes;
  for (std::uint64_t i = 0; i < mutants; ++i) {
    std::filesystem::remove(folder / name);  // much faster than to write over it
    write_bytes(folder / name, mutant_of(good, i));
    const Outcome outcome = try_to_read(folder / name);
    ASSERT_NE(outcome, Outcome::Wrong) << "mutant " << i << " of seed " << seed();
    ++(outcome == Outcome::Read ? outcomes.read : outcomes.refused);
  }
  fmt::print("{} read, {} refused\n", outcomes.read, outcomes.refused);
  EXPECT_GT(outcomes.read, mutants / 50) << "the mutants are too wild to reach the codes";
  EXPECT_GT(outcomes.refused, mutants / 10) << "the mutants are too tame";
}

TEST(TraceFileFuzz, mutated_csv_is_read_or_refused) { fuzz("t.csv", 3'000); }

TEST(TraceFileFuzz, mutated_npy_is_read_or_refused) { fuzz("t.npy", 3'000); }

TEST(TraceFileFuzz, mutated_hdf5_is_read_or_refused) { fuzz("t.h5", 250); }

}  // namespace
}  // namespace cistern
