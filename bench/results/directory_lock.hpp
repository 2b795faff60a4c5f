#pragma once
/// \file
/// Keeps two runs out of one directory.
#include <filesystem>

namespace cistern {

/// Held as long as it lives, and by no process that has ended: a killed run leaves no lock behind.
class DirectoryLock {
 public:
  /// InputError when another run holds it.
  explicit DirectoryLock(const std::filesystem::path& directory);
  ~DirectoryLock();
  DirectoryLock(const DirectoryLock&) = delete;
  DirectoryLock& operator=(const DirectoryLock&) = delete;

 private:
  int descriptor_;
};

}  // namespace cistern
