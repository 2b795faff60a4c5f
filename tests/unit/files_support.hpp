#pragma once
/// \file
/// Trace files for tests: in a folder of their own, written and read whole.
#include <gtest/gtest.h>
#include <unistd.h>

#include <filesystem>
#include <fstream>
#include <string>
#include <string_view>
#include <vector>

#include "traces/base/random.hpp"
#include "traces/files/trace_file.hpp"

namespace cistern {

/// Gone when the test ends.
class TraceFolder {
 public:
  TraceFolder() {
    std::string pattern = (std::filesystem::temp_directory_path() / "cistern-files-XXXXXX").string();
    if (mkdtemp(pattern.data()) == nullptr) throw SystemFault("no folder for a test");
    path_ = pattern;
  }
  ~TraceFolder() {
    std::error_code ignored;
    std::filesystem::remove_all(path_, ignored);
  }
  TraceFolder(const TraceFolder&) = delete;
  TraceFolder& operator=(const TraceFolder&) = delete;
  [[nodiscard]] const std::filesystem::path& path() const { return path_; }
  [[nodiscard]] std::filesystem::path operator/(std::string_view name) const { return path_ / name; }

 private:
  std::filesystem::path path_;
};

/// All that a trace file holds, for comparison.
struct WholeFile {
  TraceFileInfo info;
  std::vector<Codes> traces;
  std::vector<std::optional<GpsNanoseconds>> starts;
  std::vector<TruthColumn> truth;
};

inline void write_bytes(const std::filesystem::path& path, std::string_view bytes) {
  std::ofstream(path, std::ios::binary) << bytes;
}

inline std::string bytes_of(const std::filesystem::path& path) {
  std::ifstream stream(path, std::ios::binary);
  return {std::istreambuf_iterator<char>(stream), {}};
}

/// Writes all traces in blocks of `max_samples`.
inline void write_whole(const std::filesystem::path& path, const WholeFile& file, std::size_t max_samples = SIZE_MAX) {
  const auto writer = create_trace_file(path, file.info);
  for (std::size_t t = 0; t < file.traces.size(); ++t) {
    const CodesView codes = file.traces[t].view();
    for (std::size_t s = 0; s < codes.samples();) {
      const std::size_t count = std::min(max_samples, codes.samples() - s);
      writer->append({static_cast<std::int64_t>(t), static_cast<std::int64_t>(s), s + count == codes.samples(),
                      file.starts[t], codes.part(s, count)});
      s += count;
    }
  }
  writer->finish(file.truth);
}

/// Reads all traces in blocks of at most `max_samples`. Throws SystemFault when the blocks do not make traces.
inline WholeFile read_whole(const std::filesystem::path& path, std::size_t max_samples = SIZE_MAX) {
  const auto reader = open_trace_file(path);
  WholeFile file{reader->info(), {}, {}, {}};
  std::int64_t expected_sample = 0;
  TraceBlock block;
  while (reader->next(max_samples, block)) {
    if (block.first_sample == 0) {
      file.traces.emplace_back(file.info.channels, file.info.samples);
      file.starts.push_back(block.start_ns);
    }
    const auto end = expected_sample + static_cast<std::int64_t>(block.codes.samples());
    const bool is_end = end == static_cast<std::int64_t>(file.info.samples);
    if (block.trace + 1 != static_cast<std::int64_t>(file.traces.size()) || block.first_sample != expected_sample ||
        block.codes.samples() > max_samples || block.last_of_trace != is_end || block.start_ns != file.starts.back()) {
      throw SystemFault("blocks do not follow each other");
    }
    for (std::size_t c = 0; c < file.info.channels; ++c) {
      const auto from = block.codes.channel(c);
      std::copy(from.begin(), from.end(), file.traces.back().channel(c).begin() + expected_sample);
    }
    expected_sample = is_end ? 0 : end;
  }
  if (expected_sample != 0) throw SystemFault("the last trace does not end");
  if (format_of(path) == TraceFormat::Hdf5) file.truth = read_truth(path);
  return file;
}

inline std::size_t below(RandomStream& stream, std::size_t count) {
  return static_cast<std::size_t>(stream.next_word()) % count;
}

/// Random codes of `bits` bits; says nothing about itself but the shape.
inline WholeFile random_file(std::size_t traces, std::size_t channels, std::size_t samples, int bits,
                             RandomStream& stream) {
  WholeFile file;
  file.info.traces = static_cast<std::int64_t>(traces);
  file.info.channels = channels;
  file.info.samples = samples;
  for (std::size_t t = 0; t < traces; ++t) {
    file.traces.emplace_back(channels, samples);
    file.starts.emplace_back();
    for (std::size_t c = 0; c < channels; ++c) {
      for (std::int16_t& code : file.traces.back().channel(c)) {
        code = static_cast<std::int16_t>(stream.next_word() & ((1U << static_cast<unsigned>(bits)) - 1));
      }
    }
  }
  return file;
}

inline bool have_equal_codes(const WholeFile& a, const WholeFile& b) {
  const auto equal = [](const Codes& x, const Codes& y) {
    if (x.channels() != y.channels()) return false;
    for (std::size_t c = 0; c < x.channels(); ++c) {
      const auto left = x.channel(c);
      const auto right = y.channel(c);
      if (!std::equal(left.begin(), left.end(), right.begin(), right.end())) return false;
    }
    return true;
  };
  return std::equal(a.traces.begin(), a.traces.end(), b.traces.begin(), b.traces.end(), equal);
}

/// The message of the fault that reading the whole file gives, without the folder; empty when there is none.
inline std::string fault_of_reading(const std::filesystem::path& path) {
  try {
    (void)read_whole(path);
  } catch (const InputError& error) {
    std::string what = error.what();
    const std::string folder = path.parent_path().string() + "/";
    for (auto at = what.find(folder); at != std::string::npos; at = what.find(folder)) what.erase(at, folder.size());
    return what;
  }
  return "";
}

/// One line of plain text that starts with the place and says what was expected.
/// \param says  what it must contain, the place first
inline void expect_refusal(const std::string& fault, const std::vector<const char*>& says) {
  EXPECT_EQ(fault.rfind(says.front(), 0), 0U) << fault;
  for (const char* words : says) EXPECT_NE(fault.find(words), std::string::npos) << words << " in: " << fault;
  const bool says_what_is_good =
      fault.find("expected") != std::string::npos || fault.find("nearest") != std::string::npos;
  EXPECT_TRUE(says_what_is_good) << fault;
  for (const char c : fault) EXPECT_TRUE(c >= 0x20 && c < 0x7F) << fault;
}

}  // namespace cistern
