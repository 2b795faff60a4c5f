#include <fmt/format.h>

#include <algorithm>

#include "traces/base/errors.hpp"
#include "traces/files/formats.hpp"
#include "traces/files/hdf5_handles.hpp"

namespace cistern {
namespace fs = std::filesystem;
namespace {

constexpr hsize_t chunk_samples = 16'384;   // of one channel: 32 KiB, and short traces share a chunk
constexpr unsigned deflate_level = 1;       // faster than the disk; higher levels gain little on noise

[[noreturn]] void fail(const std::string& name) { throw SystemFault(name + ": cannot write (is the disk full?)"); }

class Hdf5Writer : public TraceWriter {
 public:
  Hdf5Writer(const fs::path& path, const TraceFileInfo& info)
      : name_(path.string()), info_(info), file_(H5Fcreate(path.c_str(), H5F_ACC_TRUNC, H5P_DEFAULT, H5P_DEFAULT), H5Fclose), codes_(create_codes()) {
    write_facts();
  }

  void append(const TraceBlock& block) override {
    const Hdf5Silence silence;
    if (sample_ == 0) start_trace(block);
    const hsize_t count = block.codes.samples();
    const hsize_t shape[3] = {1, info_.channels, count};
    const hsize_t start[3] = {static_cast<hsize_t>(traces_ - 1), 0, static_cast<hsize_t>(sample_)};
    std::vector<std::int16_t> packed;
    packed.reserve(info_.channels * count);
    for (std::size_t c = 0; c < info_.channels; ++c) packed.insert(packed.end(), block.codes.channel(c).begin(), block.codes.channel(c).end());
    const Hdf5Handle to(H5Dget_space(codes_.get()), H5Sclose);
    const Hdf5Handle from(H5Screate_simple(3, shape, nullptr), H5Sclose);
    H5Sselect_hyperslab(to.get(), H5S_SELECT_SET, start, nullptr, shape, nullptr);
    if (H5Dwrite(codes_.get(), H5T_NATIVE_INT16, from.get(), to.get(), H5P_DEFAULT, packed.data()) < 0) fail(name_);
    sample_ += static_cast<std::int64_t>(count);
    if (!block.last_of_trace) return;
    CISTERN_ASSERT(sample_ == static_cast<std::int64_t>(info_.samples));
    sample_ = 0;
  }

  void finish(const std::vector<TruthColumn>& truth) override {
    const Hdf5Silence silence;
    if (!starts_.empty() && starts_.size() == static_cast<std::size_t>(traces_)) write_column(file_.get(), "start_ns", H5T_STD_I64LE, H5T_NATIVE_INT64, starts_.size(), starts_.data());
    if (!truth.empty()) write_truth(truth);
    if (H5Fflush(file_.get(), H5F_SCOPE_GLOBAL) < 0) fail(name_);
  }

 private:
  Hdf5Handle create_codes() const {
    if (!file_.is_open()) fail(name_);
    const hsize_t samples = std::min<hsize_t>(info_.samples, chunk_samples);
    const hsize_t chunk[3] = {std::max<hsize_t>(1, std::min<hsize_t>(chunk_samples / samples, 1024)), info_.channels, samples};
    const hsize_t shape[3] = {0, info_.channels, info_.samples};
    const hsize_t limits[3] = {H5S_UNLIMITED, info_.channels, info_.samples};
    const Hdf5Handle properties(H5Pcreate(H5P_DATASET_CREATE), H5Pclose);
    H5Pset_chunk(properties.get(), 3, chunk);
    H5Pset_deflate(properties.get(), deflate_level);
    const Hdf5Handle space(H5Screate_simple(3, shape, limits), H5Sclose);
    Hdf5Handle codes(H5Dcreate2(file_.get(), "/codes", H5T_STD_I16LE, space.get(), H5P_DEFAULT, properties.get(), H5P_DEFAULT), H5Dclose);
    if (!codes.is_open()) fail(name_);
    return codes;
  }

  void start_trace(const TraceBlock& block) {
    const hsize_t shape[3] = {static_cast<hsize_t>(++traces_), info_.channels, info_.samples};
    if (H5Dset_extent(codes_.get(), shape) < 0) fail(name_);
    if (block.start_ns) starts_.push_back(*block.start_ns);
  }

  void write_facts() const {
    const hid_t file = file_.get();
    const auto numbers = [&](const char* name, const auto& values) {
      if (values) write_numbers_attribute(file, name, {values->begin(), values->end()});
    };
    if (info_.sample_rate_mhz) write_numbers_attribute(file, "sample_rate_mhz", {*info_.sample_rate_mhz});
    if (info_.bits) write_numbers_attribute(file, "bits", {static_cast<double>(*info_.bits)});
    numbers("baseline_counts", info_.baseline_counts);
    numbers("height_counts_per_vem", info_.height_counts_per_vem);
    numbers("area_counts_per_vem", info_.area_counts_per_vem);
    if (info_.live_time_s) write_numbers_attribute(file, "live_time_s", {*info_.live_time_s});
    if (info_.selection) write_text_attribute(file, "selection", *info_.selection);
    if (info_.contiguous) write_numbers_attribute(file, "contiguous", {1});
  }

  void write_column(hid_t where, const char* name, hid_t file_type, hid_t memory_type, std::size_t count, const void* values) const {
    const hsize_t length = count;
    const Hdf5Handle space(H5Screate_simple(1, &length, nullptr), H5Sclose);
    const Hdf5Handle data(H5Dcreate2(where, name, file_type, space.get(), H5P_DEFAULT, H5P_DEFAULT, H5P_DEFAULT), H5Dclose);
    if (!data.is_open() || H5Dwrite(data.get(), memory_type, H5S_ALL, H5S_ALL, H5P_DEFAULT, values) < 0) fail(name_);
  }

  void write_truth(const std::vector<TruthColumn>& truth) const {
    const Hdf5Handle group(H5Gcreate2(file_.get(), "/truth", H5P_DEFAULT, H5P_DEFAULT, H5P_DEFAULT), H5Gclose);
    for (const TruthColumn& column : truth) {
      CISTERN_ASSERT(column.values.size() == static_cast<std::size_t>(traces_));
      write_column(group.get(), column.name.c_str(), H5T_IEEE_F64LE, H5T_NATIVE_DOUBLE, column.values.size(), column.values.data());
      const Hdf5Handle data(H5Dopen2(group.get(), column.name.c_str(), H5P_DEFAULT), H5Dclose);
      write_text_attribute(data.get(), "unit", column.unit);
    }
  }

  std::string name_;
  TraceFileInfo info_;
  Hdf5Handle file_;
  Hdf5Handle codes_;
  std::vector<std::int64_t> starts_;
  std::int64_t traces_{0};
  std::int64_t sample_{0};
};

}  // namespace

std::unique_ptr<TraceWriter> create_hdf5(const fs::path& temporary, const TraceFileInfo& info) {
  const Hdf5Silence silence;
  return std::make_unique<Hdf5Writer>(temporary, info);
}

}  // namespace cistern
