#include "bench/results/directory_lock.hpp"

#include <fcntl.h>
#include <sys/file.h>
#include <unistd.h>

#include <cerrno>
#include <cstring>

#include "traces/base/errors.hpp"

namespace cistern {

DirectoryLock::DirectoryLock(const std::filesystem::path& directory)
    : descriptor_(::open(directory.c_str(), O_RDONLY | O_DIRECTORY | O_CLOEXEC)) {
  if (descriptor_ < 0) throw SystemFault(directory.string() + ": " + std::strerror(errno));
  // Where the file system has no locks the run goes on without.
  if (::flock(descriptor_, LOCK_EX | LOCK_NB) == 0 || errno != EWOULDBLOCK) return;
  ::close(descriptor_);
  throw InputError(directory.string(),
                   "another run is writing it now; expected its end, or --out with another directory");
}

DirectoryLock::~DirectoryLock() { ::close(descriptor_); }

}  // namespace cistern
