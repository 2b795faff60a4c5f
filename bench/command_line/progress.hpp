#pragma once
/// \file
/// Progress on standard error: one line drawn over itself on a terminal, plain lines otherwise.
#include <chrono>
#include <cstdint>
#include <string>
#include <string_view>

namespace cistern {

enum class ProgressStyle { Terminal, Plain, Silent };

/// Terminal when standard error is one, Plain otherwise.
[[nodiscard]] ProgressStyle style_of_standard_error();

class Progress {
 public:
  explicit Progress(ProgressStyle style);
  ~Progress();
  Progress(const Progress&) = delete;
  Progress& operator=(const Progress&) = delete;

  /// \param total  0: not known
  void advance(std::string_view stage, std::int64_t done, std::int64_t total);
  /// Ends the line on a terminal, so that other text can follow.
  void finish();

 private:
  using Clock = std::chrono::steady_clock;
  void begin_stage(std::string_view stage, std::int64_t done);
  [[nodiscard]] bool is_due(std::int64_t done, std::int64_t total) const;
  void draw(std::int64_t done, std::int64_t total);

  ProgressStyle style_;
  std::string stage_;
  Clock::time_point stage_start_;
  Clock::time_point last_drawn_;
  std::int64_t first_done_{0};
  bool line_is_open_{false};
};

/// "12 s", "3 min 20 s", "2 h 05 min".
[[nodiscard]] std::string duration_text(double seconds);

/// What is left at the pace so far: "41 %, 12 s left". \param elapsed_s  since `first_done` units were done
[[nodiscard]] std::string progress_text(std::int64_t done, std::int64_t total, std::int64_t first_done,
                                        double elapsed_s);

}  // namespace cistern
