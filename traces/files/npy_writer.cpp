/// \file
/// The header comes first, so the number of traces must be known; each block goes to its place.
#include "traces/base/errors.hpp"
#include "traces/files/formats.hpp"
#include "traces/files/npy_header.hpp"

namespace cistern {
namespace {

class NpyWriter : public TraceWriter {
 public:
  NpyWriter(const TemporaryFile& file, const TraceFileInfo& info)
      : file_(file.path(), file.target().string()),
        channels_(static_cast<std::int64_t>(info.channels)),
        samples_(static_cast<std::int64_t>(info.samples)),
        head_(npy_head({info.traces.value(), channels_, samples_})) {
    file_.write(head_.data(), head_.size(), 0);
  }

  void append(const TraceBlock& block) override {
    for (std::int64_t c = 0; c < channels_; ++c) {
      const auto codes = block.codes.channel(static_cast<std::size_t>(c));
      const std::int64_t first_code = (trace_ * channels_ + c) * samples_ + sample_;
      file_.write(codes.data(), codes.size_bytes(), static_cast<std::int64_t>(head_.size()) + 2 * first_code);
    }
    sample_ = block.last_of_trace ? 0 : sample_ + static_cast<std::int64_t>(block.codes.samples());
    if (block.last_of_trace) ++trace_;
  }

  void finish(const std::vector<TruthColumn>&) override {}

 private:
  OutputFile file_;
  std::int64_t channels_;
  std::int64_t samples_;
  std::string head_;
  std::int64_t trace_{0};
  std::int64_t sample_{0};
};

}  // namespace

std::unique_ptr<TraceWriter> create_npy(const TemporaryFile& file, const TraceFileInfo& info) {
  return std::make_unique<NpyWriter>(file, info);
}

}  // namespace cistern
