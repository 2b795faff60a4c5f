#pragma once
/// \file
/// timing.json: the one file of a run that says when, where and how long.
#include <chrono>
#include <filesystem>

namespace cistern {

class Stopwatch {
 public:
  Stopwatch() : started_(std::chrono::system_clock::now()), start_(std::chrono::steady_clock::now()) {}
  [[nodiscard]] std::chrono::system_clock::time_point started() const noexcept { return started_; }
  [[nodiscard]] double seconds() const {
    return std::chrono::duration<double>(std::chrono::steady_clock::now() - start_).count();
  }

 private:
  std::chrono::system_clock::time_point started_;
  std::chrono::steady_clock::time_point start_;
};

void write_timing(const std::filesystem::path& directory, const Stopwatch& stopwatch, int jobs, bool complete);

}  // namespace cistern
