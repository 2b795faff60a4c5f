#include "bench/campaign/worker.hpp"

#include <fmt/format.h>
#include <sys/prctl.h>
#include <sys/wait.h>
#include <unistd.h>

#include <array>
#include <cerrno>
#include <csignal>
#include <cstring>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

struct ReplyHeader {
  std::int64_t unit;
  std::uint64_t place_size;
  std::uint64_t bytes_size;
  ReplyKind kind;
};

bool read_all(int descriptor, void* to, std::size_t size) {
  auto* next = static_cast<char*>(to);
  while (size > 0) {
    const ssize_t got = ::read(descriptor, next, size);
    if (got < 0 && errno == EINTR) continue;
    if (got <= 0) return false;
    next += got;
    size -= static_cast<std::size_t>(got);
  }
  return true;
}

bool write_all(int descriptor, const void* from, std::size_t size) {
  const auto* next = static_cast<const char*>(from);
  while (size > 0) {
    const ssize_t put = ::write(descriptor, next, size);
    if (put < 0 && errno == EINTR) continue;
    if (put <= 0) return false;
    next += put;
    size -= static_cast<std::size_t>(put);
  }
  return true;
}

Reply run_unit(const std::function<std::string(std::int64_t)>& work, std::int64_t unit) {
  try {
    return {unit, ReplyKind::Result, {}, work(unit)};
  } catch (const InputError& error) {
    return {unit, ReplyKind::InputFault, error.place(), error.expectation()};
  } catch (const std::exception& error) {
    return {unit, ReplyKind::SystemTrouble, {}, error.what()};
  }
}

bool send(int descriptor, const Reply& reply) {
  ReplyHeader header{};
  header.unit = reply.unit;
  header.place_size = reply.place.size();
  header.bytes_size = reply.bytes.size();
  header.kind = reply.kind;
  return write_all(descriptor, &header, sizeof header) &&
         write_all(descriptor, reply.place.data(), reply.place.size()) &&
         write_all(descriptor, reply.bytes.data(), reply.bytes.size());
}

[[noreturn]] void serve(const std::function<std::string(std::int64_t)>& work, int from_parent, int to_parent) {
  // The terminal sends Ctrl-C to the whole group; the parent decides what it means. A parent that
  // is killed takes its workers along.
  std::signal(SIGINT, SIG_IGN);
  ::prctl(PR_SET_PDEATHSIG, SIGKILL);
  std::int64_t unit = 0;
  while (read_all(from_parent, &unit, sizeof unit)) {
    if (!send(to_parent, run_unit(work, unit))) break;
  }
  ::_exit(0);
}

std::array<int, 2> make_pipe() {
  std::array<int, 2> ends{};
  if (::pipe(ends.data()) != 0) throw SystemFault(fmt::format("cannot make a pipe: {}", std::strerror(errno)));
  return ends;
}

}  // namespace

Worker::Worker(const std::function<std::string(std::int64_t)>& work) {
  const auto down = make_pipe();
  const auto up = make_pipe();
  child_ = ::fork();
  if (child_ < 0) throw SystemFault(fmt::format("cannot start a worker process: {}", std::strerror(errno)));
  if (child_ == 0) {
    ::close(down[1]);
    ::close(up[0]);
    serve(work, down[0], up[1]);
  }
  ::close(down[0]);
  ::close(up[1]);
  to_child_ = down[1];
  from_child_ = up[0];
}

Worker::~Worker() {
  ::close(to_child_);
  ::close(from_child_);
  // Later workers hold copies of this one's pipe, so closing it does not end the child. It keeps
  // nothing that would be lost.
  ::kill(child_, SIGKILL);
  ::waitpid(child_, nullptr, 0);
}

void Worker::start(std::int64_t unit) {
  CISTERN_ASSERT(!is_busy());
  unit_ = unit;
  if (!write_all(to_child_, &unit, sizeof unit)) throw SystemFault("a worker process is gone");
}

Reply Worker::finish() {
  ReplyHeader header{};
  Reply reply;
  bool whole = read_all(from_child_, &header, sizeof header);
  if (whole) {
    reply.unit = header.unit;
    reply.kind = header.kind;
    reply.place.resize(header.place_size);
    reply.bytes.resize(header.bytes_size);
    whole = read_all(from_child_, reply.place.data(), reply.place.size()) &&
            read_all(from_child_, reply.bytes.data(), reply.bytes.size());
  }
  if (!whole) throw SystemFault(fmt::format("a worker process died in unit {}", unit_));
  unit_ = -1;
  return reply;
}

}  // namespace cistern
