/// \file
/// One chunk at a time: short traces share one, long ones are cut into several, so that each is packed once.
#include <algorithm>

#include "traces/base/errors.hpp"
#include "traces/files/formats.hpp"
#include "traces/files/hdf5_facts.hpp"
#include "traces/files/hdf5_starts.hpp"
#include "traces/files/hdf5_truth.hpp"

namespace cistern {
namespace {

constexpr std::size_t chunk_samples = 16'384;  // of one channel: 32 KiB
constexpr unsigned deflate_level = 1;          // higher levels gain little on noise

class Hdf5Writer : public TraceWriter {
 public:
  Hdf5Writer(const TemporaryFile& file, const TraceFileInfo& info)
      : name_(file.target().string()),
        channels_(info.channels),
        samples_(info.samples),
        chunk_traces_(std::max<std::size_t>(1, chunk_samples / info.samples)),
        chunk_samples_(std::min(info.samples, chunk_samples)),
        chunk_(chunk_traces_ * channels_ * chunk_samples_),
        file_(H5Fcreate(file.path().c_str(), H5F_ACC_TRUNC, H5P_DEFAULT, H5P_DEFAULT), H5Fclose),
        codes_(create_codes()),
        starts_(file_.get(), name_) {
    guard([&] {
      // Twice, so that /codes keeps them when it is copied to another file.
      write_hdf5_facts(file_.get(), name_, info);
      write_hdf5_facts(codes_.get(), name_, info);
    });
  }

  void append(const TraceBlock& block) override {
    guard([&] { add(block); });
  }

  void finish(const std::vector<TruthColumn>& truth) override {
    guard([&] {
      if (trace_ > chunk_first_trace_) flush(trace_ - chunk_first_trace_, samples_ - chunk_first_sample_);
      starts_.finish();
      write_hdf5_truth(file_.get(), name_, truth);
      if (H5Fflush(file_.get(), H5F_SCOPE_GLOBAL) < 0 || !codes_.close() || !file_.close()) fail();
    });
  }

 private:
  [[noreturn]] void fail() const { throw SystemFault(name_ + ": /codes cannot be written (is the disk full?)"); }

  [[nodiscard]] Hdf5Handle create_codes() const {
    const hsize_t shape[3] = {0, channels_, samples_};
    const hsize_t limits[3] = {H5S_UNLIMITED, channels_, samples_};
    const hsize_t chunk[3] = {chunk_traces_, channels_, chunk_samples_};
    const Hdf5Handle space(H5Screate_simple(3, shape, limits), H5Sclose);
    const Hdf5Handle properties(H5Pcreate(H5P_DATASET_CREATE), H5Pclose);
    H5Pset_chunk(properties.get(), 3, chunk);
    H5Pset_deflate(properties.get(), deflate_level);
    H5Pset_obj_track_times(properties.get(), false);  // the same traces make the same bytes
    Hdf5Handle codes(
        H5Dcreate2(file_.get(), "codes", H5T_STD_I16LE, space.get(), H5P_DEFAULT, properties.get(), H5P_DEFAULT),
        H5Dclose);
    if (!codes.is_open()) fail();
    return codes;
  }

  /// HDF5 1.10 crashes when it closes what it cannot write, so after a fault nothing is closed.
  template <typename Work>
  void guard(const Work& work) {
    try {
      work();
    } catch (const SystemFault&) {
      starts_.abandon();
      codes_.abandon();
      file_.abandon();
      throw;
    }
  }

  void add(const TraceBlock& block) {
    if (sample_ == 0) starts_.add(block.start_ns);
    for (std::size_t first = 0; first < block.codes.samples();) {
      const std::size_t in_chunk = sample_ - chunk_first_sample_;
      const std::size_t count = std::min(block.codes.samples() - first, chunk_samples_ - in_chunk);
      gather(block.codes.part(first, count), in_chunk);
      first += count;
      sample_ += count;
      if (sample_ == samples_) {
        end_trace();
      } else if (sample_ == chunk_first_sample_ + chunk_samples_) {
        flush(1, chunk_samples_);
        chunk_first_sample_ = sample_;
      }
    }
  }

  /// Copies samples of one trace into the chunk that is being filled.
  void gather(const CodesView& codes, std::size_t first_in_chunk) {
    for (std::size_t c = 0; c < channels_; ++c) {
      const std::size_t run = (trace_ - chunk_first_trace_) * channels_ + c;
      const auto from = codes.channel(c);
      std::copy(from.begin(), from.end(),
                chunk_.begin() + static_cast<std::ptrdiff_t>(run * chunk_samples_ + first_in_chunk));
    }
  }

  void end_trace() {
    ++trace_;
    sample_ = 0;
    if (trace_ - chunk_first_trace_ < chunk_traces_) return;
    flush(chunk_traces_, samples_ - chunk_first_sample_);
    chunk_first_trace_ = trace_;
    chunk_first_sample_ = 0;
  }

  /// Writes the filled part of the chunk.
  void flush(std::size_t traces, std::size_t samples) {
    const hsize_t shape[3] = {chunk_first_trace_ + traces, channels_, samples_};
    const hsize_t start[3] = {chunk_first_trace_, 0, chunk_first_sample_};
    const hsize_t count[3] = {traces, channels_, samples};
    const hsize_t held[3] = {chunk_traces_, channels_, chunk_samples_};
    const hsize_t origin[3] = {0, 0, 0};
    const bool is_extended = H5Dset_extent(codes_.get(), shape) >= 0;
    const Hdf5Handle to(H5Dget_space(codes_.get()), H5Sclose);
    const Hdf5Handle from(H5Screate_simple(3, held, nullptr), H5Sclose);
    H5Sselect_hyperslab(to.get(), H5S_SELECT_SET, start, nullptr, count, nullptr);
    H5Sselect_hyperslab(from.get(), H5S_SELECT_SET, origin, nullptr, count, nullptr);
    const bool is_written =
        is_extended && H5Dwrite(codes_.get(), H5T_NATIVE_INT16, from.get(), to.get(), H5P_DEFAULT, chunk_.data()) >= 0;
    if (!is_written) fail();
  }

  std::string name_;
  std::size_t channels_;
  std::size_t samples_;
  std::size_t chunk_traces_;
  std::size_t chunk_samples_;
  std::vector<std::int16_t> chunk_;  ///< (chunk_traces_, channels_, chunk_samples_)
  Hdf5Handle file_;
  Hdf5Handle codes_;
  StartsWriter starts_;
  std::size_t trace_{0};
  std::size_t sample_{0};
  std::size_t chunk_first_trace_{0};
  std::size_t chunk_first_sample_{0};
};

}  // namespace

std::unique_ptr<TraceWriter> create_hdf5(const TemporaryFile& file, const TraceFileInfo& info) {
  prepare_hdf5();
  return std::make_unique<Hdf5Writer>(file, info);
}

}  // namespace cistern
