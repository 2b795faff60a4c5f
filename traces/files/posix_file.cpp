#include "traces/files/posix_file.hpp"

#include <fcntl.h>
#include <fmt/format.h>
#include <sys/stat.h>
#include <unistd.h>

#include <cerrno>
#include <cstring>
#include <utility>

#include "traces/base/errors.hpp"

namespace cistern {
namespace fs = std::filesystem;
namespace {

[[noreturn]] void throw_fault(const std::string& name, const char* what) {
  throw SystemFault(fmt::format("{}: {} ({})", name, what, std::strerror(errno)));
}

fs::path path_beside(const fs::path& target) {
  const fs::path folder = target.parent_path().empty() ? fs::path(".") : target.parent_path();
  std::error_code ignored;  // what cannot be looked at cannot be opened either, which says more
  if (!fs::is_directory(folder, ignored)) {
    throw InputError(target.string(), "its folder does not exist; expected a file in an existing one");
  }
  if (fs::is_directory(target, ignored)) throw InputError(target.string(), "is a directory; expected a file to write");
  return folder / ("." + target.filename().string() + ".part");
}

}  // namespace

InputFile::InputFile(const fs::path& path)
    : name_(path.string()), descriptor_(::open(path.c_str(), O_RDONLY | O_CLOEXEC)) {
  if (descriptor_ < 0) {
    throw InputError(name_, fmt::format("cannot be read ({}); expected recorded traces", std::strerror(errno)));
  }
}

InputFile::~InputFile() { ::close(descriptor_); }

std::int64_t InputFile::size() const {
  struct stat status {};
  if (::fstat(descriptor_, &status) != 0) throw_fault(name_, "cannot be read");
  return status.st_size;
}

std::size_t InputFile::read_some(void* to, std::size_t bytes, std::int64_t from) const {
  std::size_t done = 0;
  while (done < bytes) {
    const ssize_t got =
        ::pread(descriptor_, static_cast<char*>(to) + done, bytes - done, from + static_cast<std::int64_t>(done));
    if (got < 0 && errno == EINTR) continue;
    if (got < 0) throw_fault(name_, "cannot be read");
    if (got == 0) break;
    done += static_cast<std::size_t>(got);
  }
  return done;
}

void InputFile::read(void* to, std::size_t bytes, std::int64_t from) const {
  const std::size_t got = read_some(to, bytes, from);
  if (got < bytes) {
    throw InputError(
        name_, fmt::format("ends at byte {}, expected {} more", from + static_cast<std::int64_t>(got), bytes - got));
  }
}

OutputFile::OutputFile(const fs::path& path, std::string name)
    : name_(std::move(name)), descriptor_(::open(path.c_str(), O_WRONLY | O_CLOEXEC)) {
  if (descriptor_ < 0) throw_fault(name_, "cannot be written");
}

OutputFile::~OutputFile() { ::close(descriptor_); }

void OutputFile::write(const void* from, std::size_t bytes, std::int64_t at) const {
  for (std::size_t done = 0; done < bytes;) {
    const ssize_t put = ::pwrite(descriptor_, static_cast<const char*>(from) + done, bytes - done,
                                 at + static_cast<std::int64_t>(done));
    if (put < 0 && errno == EINTR) continue;
    if (put < 0) throw_fault(name_, "cannot be written");
    done += static_cast<std::size_t>(put);
  }
}

void OutputFile::append(std::string_view text) {
  write(text.data(), text.size(), end_);
  end_ += static_cast<std::int64_t>(text.size());
}

TemporaryFile::TemporaryFile(fs::path target) : target_(std::move(target)), path_(path_beside(target_)) {
  const int descriptor = ::open(path_.c_str(), O_WRONLY | O_CREAT | O_TRUNC | O_CLOEXEC, 0666);
  if (descriptor < 0) {
    throw InputError(target_.string(),
                     fmt::format("cannot be written ({}); expected a place to write to", std::strerror(errno)));
  }
  ::close(descriptor);
}

TemporaryFile::~TemporaryFile() {
  std::error_code ignored;
  if (!is_published_) fs::remove(path_, ignored);
}

void TemporaryFile::publish() {
  const int descriptor = ::open(path_.c_str(), O_RDONLY | O_CLOEXEC);
  if (descriptor < 0) throw_fault(target_.string(), "cannot be written");
  const bool is_synced = ::fsync(descriptor) == 0;
  ::close(descriptor);
  if (!is_synced || ::rename(path_.c_str(), target_.c_str()) != 0) throw_fault(target_.string(), "cannot be written");
  is_published_ = true;
}

}  // namespace cistern
