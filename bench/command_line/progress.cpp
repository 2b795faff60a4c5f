#include "bench/command_line/progress.hpp"

#include <fmt/format.h>
#include <unistd.h>

#include <cstdio>

namespace cistern {
namespace {
using namespace std::chrono_literals;
constexpr auto terminal_interval = 200ms;
constexpr auto plain_interval = 5s;
}  // namespace

ProgressStyle style_of_standard_error() {
  return ::isatty(STDERR_FILENO) == 1 ? ProgressStyle::Terminal : ProgressStyle::Plain;
}

std::string duration_text(double seconds) {
  const auto whole = static_cast<std::int64_t>(seconds + 0.5);
  if (whole < 60) return fmt::format("{} s", whole);
  if (whole < 3600) return fmt::format("{} min {:02} s", whole / 60, whole % 60);
  return fmt::format("{} h {:02} min", whole / 3600, whole % 3600 / 60);
}

std::string progress_text(std::int64_t done, std::int64_t total, std::int64_t first_done, double elapsed_s) {
  if (total <= 0) return fmt::format("{} done", done);
  const std::string percent = fmt::format("{} %", 100 * done / total);
  if (done <= first_done || done >= total) return percent;
  const double left_s = elapsed_s * static_cast<double>(total - done) / static_cast<double>(done - first_done);
  return fmt::format("{}, {} left", percent, duration_text(left_s));
}

Progress::Progress(ProgressStyle style) : style_(style) {}
Progress::~Progress() { finish(); }

void Progress::advance(std::string_view stage, std::int64_t done, std::int64_t total) {
  if (style_ == ProgressStyle::Silent) return;
  if (stage != stage_) begin_stage(stage, done);
  if (is_due(done, total)) draw(done, total);
}

void Progress::begin_stage(std::string_view stage, std::int64_t done) {
  finish();
  stage_ = stage;
  stage_start_ = last_drawn_ = Clock::now();
  first_done_ = done;
}

bool Progress::is_due(std::int64_t done, std::int64_t total) const {
  const auto interval =
      style_ == ProgressStyle::Terminal ? Clock::duration(terminal_interval) : Clock::duration(plain_interval);
  return (total > 0 && done == total) || Clock::now() - last_drawn_ >= interval;
}

void Progress::draw(std::int64_t done, std::int64_t total) {
  last_drawn_ = Clock::now();
  const double elapsed_s = std::chrono::duration<double>(last_drawn_ - stage_start_).count();
  const std::string text = fmt::format("{}: {}", stage_, progress_text(done, total, first_done_, elapsed_s));
  if (style_ == ProgressStyle::Terminal) {
    fmt::print(stderr, "\r{}\x1b[K", text);
    line_is_open_ = true;
  } else {
    fmt::print(stderr, "{}\n", text);
  }
  std::fflush(stderr);
}

void Progress::finish() {
  if (line_is_open_) fmt::print(stderr, "\n");
  line_is_open_ = false;
  stage_.clear();
}

}  // namespace cistern
