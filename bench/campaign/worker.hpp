#pragma once
/// \file
/// One worker process: a forked child that takes unit numbers and sends back results.
#include <sys/types.h>

#include <cstdint>
#include <functional>
#include <string>

namespace cistern {

/// What came back from a worker.
enum class ReplyKind : std::uint8_t { Result, InputFault, SystemTrouble };

struct Reply {
  std::int64_t unit{0};
  ReplyKind kind{ReplyKind::Result};
  std::string place;  ///< InputFault: the place, the rest is in `bytes`
  std::string bytes;
};

/// Forks on construction; ends the child on destruction. Used by the parent only.
class Worker {
 public:
  explicit Worker(const std::function<std::string(std::int64_t)>& work);
  ~Worker();
  Worker(const Worker&) = delete;
  Worker& operator=(const Worker&) = delete;

  void start(std::int64_t unit);
  /// Blocks until the reply of the started unit is there. \throws SystemFault when the child died.
  [[nodiscard]] Reply finish();
  [[nodiscard]] bool is_busy() const noexcept { return unit_ >= 0; }
  [[nodiscard]] int reply_descriptor() const noexcept { return from_child_; }

 private:
  pid_t child_{-1};
  int to_child_{-1};
  int from_child_{-1};
  std::int64_t unit_{-1};
};

}  // namespace cistern
