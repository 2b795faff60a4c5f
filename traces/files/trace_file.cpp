#include "traces/files/trace_file.hpp"

#include <fcntl.h>
#include <fmt/format.h>
#include <unistd.h>

#include <algorithm>
#include <cctype>
#include <cerrno>
#include <cstring>

#include "traces/files/file_facts.hpp"
#include "traces/files/formats.hpp"

namespace cistern {
namespace fs = std::filesystem;
namespace {

/// A writer under a temporary name beside its target; renamed when it finishes, removed otherwise.
class RenamingWriter : public TraceWriter {
 public:
  RenamingWriter(fs::path target, const TraceFileInfo& info) : target_(std::move(target)), temporary_(temporary_name(target_)) {
    switch (format_of(target_)) {
      case TraceFormat::Csv: writer_ = create_csv(temporary_, info); break;
      case TraceFormat::Npy: writer_ = create_npy(temporary_, info); break;
      case TraceFormat::Hdf5: writer_ = create_hdf5(temporary_, info); break;
    }
  }
  ~RenamingWriter() override {
    writer_.reset();
    std::error_code ignored;
    if (!finished_) fs::remove(temporary_, ignored);
  }

  void append(const TraceBlock& block) override { writer_->append(block); }

  void finish(const std::vector<TruthColumn>& truth) override {
    if (!truth.empty() && format_of(target_) != TraceFormat::Hdf5) throw InputError(target_.string(), "cannot hold truth columns; expected an .h5 file");
    writer_->finish(truth);
    writer_.reset();
    sync();
    std::error_code error;
    fs::rename(temporary_, target_, error);
    if (error) throw SystemFault(fmt::format("{}: {}", target_.string(), error.message()));
    finished_ = true;
  }

 private:
  static fs::path temporary_name(const fs::path& target) {
    const fs::path folder = target.parent_path().empty() ? fs::path(".") : target.parent_path();
    if (!fs::is_directory(folder)) throw InputError(target.string(), "its folder does not exist; expected an existing one");
    if (fs::is_directory(target)) throw InputError(target.string(), "is a directory; expected a file to write");
    return folder / ("." + target.filename().string() + ".part");
  }
  void sync() const {
    const int descriptor = ::open(temporary_.c_str(), O_RDONLY);
    const bool synced = descriptor >= 0 && ::fsync(descriptor) == 0;
    if (descriptor >= 0) ::close(descriptor);
    if (!synced) throw SystemFault(fmt::format("{}: {}", temporary_.string(), std::strerror(errno)));
  }

  fs::path target_;
  fs::path temporary_;
  std::unique_ptr<TraceWriter> writer_;
  bool finished_{false};
};

}  // namespace

TraceFormat format_of(const fs::path& path) {
  std::string ending = path.extension().string();
  std::transform(ending.begin(), ending.end(), ending.begin(), [](unsigned char c) { return static_cast<char>(std::tolower(c)); });
  if (ending == ".csv") return TraceFormat::Csv;
  if (ending == ".npy") return TraceFormat::Npy;
  if (ending == ".h5" || ending == ".hdf5") return TraceFormat::Hdf5;
  throw InputError(path.string(), "its name does not end in a known way; expected .csv, .npy, .h5 or .hdf5");
}

std::unique_ptr<TraceReader> open_trace_file(const fs::path& path) {
  const TraceFormat format = format_of(path);
  require_file(path);
  switch (format) {
    case TraceFormat::Csv: return open_csv(path);
    case TraceFormat::Npy: return open_npy(path);
    case TraceFormat::Hdf5: return open_hdf5(path);
  }
  report_bug("known trace format", __FILE__, __LINE__);
}

std::unique_ptr<TraceWriter> create_trace_file(const fs::path& path, const TraceFileInfo& info) {
  CISTERN_ASSERT(info.channels >= 1 && info.channels <= 16 && info.samples >= 1);
  return std::make_unique<RenamingWriter>(path, info);
}

}  // namespace cistern
