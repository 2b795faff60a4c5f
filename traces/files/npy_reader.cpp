/// \file
/// Whole short traces in one read; of a long trace one piece per channel.
#include <bit>

#include "traces/files/formats.hpp"
#include "traces/files/npy_header.hpp"
#include "traces/files/slab_reader.hpp"

namespace cistern {
namespace {

static_assert(std::endian::native == std::endian::little, "codes are read as they are in the file");

class NpySource : public CodesSource {
 public:
  explicit NpySource(const std::filesystem::path& path) : file_(path), header_(read_npy_header(file_)) {}

  [[nodiscard]] const NpyHeader& header() const noexcept { return header_; }

  void fetch(const Slab& slab, std::span<std::int16_t> codes) override {
    const auto [traces, channels, samples] = header_.shape;
    if (slab.samples == samples) {
      read(slab.trace * channels * samples, codes);
      return;
    }
    const auto count = static_cast<std::size_t>(slab.samples);
    for (std::int64_t c = 0; c < channels; ++c) {
      read((slab.trace * channels + c) * samples + slab.first_sample,
           codes.subspan(static_cast<std::size_t>(c) * count, count));
    }
  }

  [[nodiscard]] std::optional<GpsNanoseconds> start_of(std::int64_t) override { return {}; }

 private:
  void read(std::int64_t first_code, std::span<std::int16_t> codes) const {
    file_.read(codes.data(), codes.size_bytes(), header_.data_start + 2 * first_code);
  }

  InputFile file_;
  NpyHeader header_;
};

}  // namespace

std::unique_ptr<TraceReader> open_npy(const std::filesystem::path& path) {
  auto source = std::make_unique<NpySource>(path);
  const auto [traces, channels, samples] = source->header().shape;
  TraceFileInfo info;
  info.traces = traces;
  info.channels = static_cast<std::size_t>(channels);
  info.samples = static_cast<std::size_t>(samples);
  const bool is_unsigned = source->header().is_unsigned;
  return std::make_unique<SlabReader>(path.string(), std::move(info), choose_slab(channels, samples, {1, 1}),
                                      is_unsigned, std::move(source));
}

}  // namespace cistern
