#pragma once
/// \file
/// Files read and written at any place, with errors that say why. Internal to traces/files.
#include <cstdint>
#include <filesystem>
#include <string>
#include <string_view>

namespace cistern {

/// A file open for reading. InputError when it cannot be opened, SystemFault when the disk fails.
class InputFile {
 public:
  explicit InputFile(const std::filesystem::path& path);
  ~InputFile();
  InputFile(const InputFile&) = delete;
  InputFile& operator=(const InputFile&) = delete;

  [[nodiscard]] const std::string& name() const noexcept { return name_; }
  [[nodiscard]] std::int64_t size() const;
  /// \return the bytes read, fewer than asked for only at the end of the file
  [[nodiscard]] std::size_t read_some(void* to, std::size_t bytes, std::int64_t from) const;
  /// InputError when the file ends before.
  void read(void* to, std::size_t bytes, std::int64_t from) const;

 private:
  std::string name_;
  int descriptor_;
};

/// A file that is there already, open for writing. SystemFault when it cannot be written.
class OutputFile {
 public:
  /// \param name  for messages
  OutputFile(const std::filesystem::path& path, std::string name);
  ~OutputFile();
  OutputFile(const OutputFile&) = delete;
  OutputFile& operator=(const OutputFile&) = delete;

  void write(const void* from, std::size_t bytes, std::int64_t at) const;
  void append(std::string_view text);

 private:
  std::string name_;
  int descriptor_;
  std::int64_t end_{0};  ///< of what was appended
};

/// A file under a name of its own beside its target: empty at first, gone with this object unless published.
class TemporaryFile {
 public:
  /// InputError when nothing can be written there.
  explicit TemporaryFile(std::filesystem::path target);
  ~TemporaryFile();
  TemporaryFile(const TemporaryFile&) = delete;
  TemporaryFile& operator=(const TemporaryFile&) = delete;

  [[nodiscard]] const std::filesystem::path& path() const noexcept { return path_; }
  [[nodiscard]] const std::filesystem::path& target() const noexcept { return target_; }
  /// Waits until its bytes are on the disk, then gives it the name of its target.
  void publish();

 private:
  std::filesystem::path target_;
  std::filesystem::path path_;
  bool is_published_{false};
};

}  // namespace cistern
