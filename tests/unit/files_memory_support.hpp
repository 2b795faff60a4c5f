#pragma once
/// \file
/// How much memory work takes, measured in a process of its own.
#include <sys/resource.h>
#include <sys/wait.h>
#include <unistd.h>

#include <cstdlib>
#include <functional>
#include <iostream>

#include "tests/unit/files_support.hpp"

namespace cistern {

/// Peak resident memory of the work, MiB; SystemFault when it throws.
inline double peak_memory_mib(const std::function<void()>& work) {
  const pid_t child = fork();
  if (child == 0) {
    try {
      work();
      std::_Exit(0);
    } catch (...) {
      std::_Exit(1);
    }
  }
  int status = 0;
  rusage usage{};
  wait4(child, &status, 0, &usage);
  if (!WIFEXITED(status) || WEXITSTATUS(status) != 0) throw SystemFault("the work failed");
  return static_cast<double>(usage.ru_maxrss) / 1024;  // Linux tells KiB
}

/// What readers and writers may use, whatever the size of the file.
inline constexpr double memory_allowed_mib = 200;

/// Sanitizers keep freed memory, so that the peak says nothing.
inline constexpr bool is_peak_meaningful =
#ifdef __SANITIZE_ADDRESS__
    false;
#else
    true;
#endif

/// Fails when the work takes more than readers and writers may use; prints what it took.
inline void expect_little_memory(const char* what, const std::function<void()>& work) {
  const double peak = peak_memory_mib(work);
  std::cout << what << ": " << peak << " MiB\n";
  EXPECT_TRUE(!is_peak_meaningful || peak < memory_allowed_mib) << what << " took " << peak;
}

/// A file of zeros that takes no room on the disk: a hole behind the header.
inline void make_sparse_npy(const std::filesystem::path& path, std::int64_t traces, std::int64_t channels,
                            std::int64_t samples) {
  std::string dictionary = "{'descr': '<i2', 'fortran_order': False, 'shape': (" + std::to_string(traces) + ", " +
                           std::to_string(channels) + ", " + std::to_string(samples) + "), }";
  dictionary.resize(117, ' ');
  write_bytes(path, std::string("\x93NUMPY\x01\x00\x76\x00", 10) + dictionary + "\n");
  std::filesystem::resize_file(path, static_cast<std::uintmax_t>(128 + 2 * traces * channels * samples));
}

/// Writes traces of zeros, each with a start; the same block again and again.
inline void write_zeros(const std::filesystem::path& path, std::int64_t traces, std::size_t channels,
                        std::size_t samples) {
  TraceFileInfo info;
  info.traces = traces;
  info.channels = channels;
  info.samples = samples;
  const auto writer = create_trace_file(path, info);
  Codes codes(channels, std::min<std::size_t>(samples, 65'536));
  for (std::size_t c = 0; c < channels; ++c)
    std::fill(codes.channel(c).begin(), codes.channel(c).end(), std::int16_t{0});
  for (std::int64_t trace = 0; trace < traces; ++trace) {
    for (std::size_t s = 0; s < samples; s += codes.samples()) {
      const std::size_t count = std::min(codes.samples(), samples - s);
      writer->append({trace, static_cast<std::int64_t>(s), s + count == samples, trace, codes.view().part(0, count)});
    }
  }
  writer->finish({});
}

/// Reads all; SystemFault unless there are as many codes per channel as expected.
inline void read_through(const std::filesystem::path& path, std::int64_t expected, std::size_t max_samples = 65'536) {
  const auto reader = open_trace_file(path);
  std::int64_t samples = 0;
  TraceBlock block;
  while (reader->next(max_samples, block)) samples += static_cast<std::int64_t>(block.codes.samples());
  if (samples != expected) throw SystemFault("codes are missing");
}

}  // namespace cistern
