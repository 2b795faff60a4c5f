#include "traces/files/trace_file.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cctype>

#include "traces/files/file_facts.hpp"
#include "traces/files/formats.hpp"

namespace cistern {
namespace fs = std::filesystem;
namespace {

std::unique_ptr<TraceWriter> create_in(const TemporaryFile& file, const TraceFileInfo& info) {
  switch (format_of(file.target())) {
    case TraceFormat::Csv: return create_csv(file, info);
    case TraceFormat::Npy: return create_npy(file, info);
    case TraceFormat::Hdf5: return create_hdf5(file, info);
  }
  report_bug("known trace format", __FILE__, __LINE__);
}

/// Checks that the blocks make whole traces, and shows the file only when it is finished.
class PublishingWriter : public TraceWriter {
 public:
  PublishingWriter(const fs::path& target, const TraceFileInfo& info)
      : info_(info), file_(target), writer_(create_in(file_, info)) {}

  void append(const TraceBlock& block) override {
    CISTERN_ASSERT(block.codes.channels() == info_.channels);
    sample_ += block.codes.samples();
    CISTERN_ASSERT(block.last_of_trace ? sample_ == info_.samples : sample_ < info_.samples);
    writer_->append(block);
    if (!block.last_of_trace) return;
    sample_ = 0;
    ++traces_;
  }

  void finish(const std::vector<TruthColumn>& truth) override {
    CISTERN_ASSERT(sample_ == 0 && traces_ >= 1 && traces_ == info_.traces.value_or(traces_));
    for (const TruthColumn& column : truth) {
      CISTERN_ASSERT(column.values.size() == static_cast<std::size_t>(traces_));
    }
    if (!truth.empty() && format_of(file_.target()) != TraceFormat::Hdf5) {
      throw InputError(file_.target().string(), "cannot hold truth columns; expected an .h5 file");
    }
    writer_->finish(truth);
    writer_.reset();
    file_.publish();
  }

 private:
  TraceFileInfo info_;
  TemporaryFile file_;
  std::unique_ptr<TraceWriter> writer_;
  std::size_t sample_{0};  ///< of the trace that is being written
  std::int64_t traces_{0};
};

}  // namespace

TraceFormat format_of(const fs::path& path) {
  std::string ending = path.extension().string();
  std::transform(ending.begin(), ending.end(), ending.begin(),
                 [](unsigned char c) { return static_cast<char>(std::tolower(c)); });
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
  const TraceFormat format = format_of(path);
  CISTERN_ASSERT(format != TraceFormat::Npy || info.traces.has_value());
  return std::make_unique<PublishingWriter>(path, info);
}

}  // namespace cistern
