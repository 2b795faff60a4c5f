#include "traces/files/hdf5_starts.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

constexpr std::int64_t piece = 8'192;  // starts held at once: 64 KiB

Hdf5Handle select_range(hid_t data, std::int64_t first, std::int64_t count) {
  Hdf5Handle space(H5Dget_space(data), H5Sclose);
  const hsize_t start = static_cast<hsize_t>(first);
  const hsize_t length = static_cast<hsize_t>(count);
  H5Sselect_hyperslab(space.get(), H5S_SELECT_SET, &start, nullptr, &length, nullptr);
  return space;
}

Hdf5Handle memory_of(std::int64_t count) {
  const hsize_t length = static_cast<hsize_t>(count);
  return {H5Screate_simple(1, &length, nullptr), H5Sclose};
}

bool is_one_int64_per_trace(hid_t data, std::int64_t traces) {
  const Hdf5Handle type(H5Dget_type(data), H5Tclose);
  const Hdf5Handle space(H5Dget_space(data), H5Sclose);
  return H5Tget_class(type.get()) == H5T_INTEGER && H5Tget_size(type.get()) == 8 &&
         H5Tget_sign(type.get()) == H5T_SGN_2 && H5Sget_simple_extent_ndims(space.get()) == 1 &&
         H5Sget_simple_extent_npoints(space.get()) == traces;
}

Hdf5Handle create_starts(hid_t file) {
  const hsize_t length = 0;
  const hsize_t limit = H5S_UNLIMITED;
  const hsize_t chunk = static_cast<hsize_t>(piece);
  const Hdf5Handle space(H5Screate_simple(1, &length, &limit), H5Sclose);
  const Hdf5Handle properties(H5Pcreate(H5P_DATASET_CREATE), H5Pclose);
  H5Pset_chunk(properties.get(), 1, &chunk);
  H5Pset_deflate(properties.get(), 1);
  H5Pset_obj_track_times(properties.get(), false);  // the same traces make the same bytes
  return {H5Dcreate2(file, "start_ns", H5T_STD_I64LE, space.get(), H5P_DEFAULT, properties.get(), H5P_DEFAULT),
          H5Dclose};
}

}  // namespace

StartsReader::StartsReader(hid_t file, std::string name, std::int64_t traces)
    : name_(std::move(name)), traces_(traces) {
  if (H5Lexists(file, "start_ns", H5P_DEFAULT) <= 0) return;
  data_.emplace(H5Dopen2(file, "start_ns", H5P_DEFAULT), H5Dclose);
  if (data_->is_open() && is_one_int64_per_trace(data_->get(), traces)) return;
  throw InputError(name_ + ": /start_ns", fmt::format("is not one int64 for each of {} traces, as expected", traces));
}

std::optional<GpsNanoseconds> StartsReader::start_of(std::int64_t trace) {
  if (!data_) return {};
  if (trace < first_ || trace >= first_ + static_cast<std::int64_t>(held_.size())) {
    first_ = trace;
    held_.resize(static_cast<std::size_t>(std::min(piece, traces_ - trace)));
    const auto count = static_cast<std::int64_t>(held_.size());
    const Hdf5Handle from = select_range(data_->get(), first_, count);
    const Hdf5Handle to = memory_of(count);
    if (H5Dread(data_->get(), H5T_NATIVE_INT64, to.get(), from.get(), H5P_DEFAULT, held_.data()) < 0) {
      throw InputError(fmt::format("{}: trace {}", name_, trace),
                       "/start_ns cannot be read, expected an undamaged file");
    }
  }
  return held_[static_cast<std::size_t>(trace - first_)];
}

void StartsWriter::add(std::optional<GpsNanoseconds> start_ns) {
  is_complete_ = is_complete_ && start_ns;
  if (!is_complete_) return;
  held_.push_back(*start_ns);
  if (static_cast<std::int64_t>(held_.size()) == piece) flush();
}

void StartsWriter::finish() {
  if (is_complete_) flush();
  if (data_) close();
}

void StartsWriter::flush() {
  if (held_.empty()) return;
  if (!data_) data_.emplace(create_starts(file_));
  const auto count = static_cast<std::int64_t>(held_.size());
  const hsize_t length = static_cast<hsize_t>(written_ + count);
  const bool is_extended = H5Dset_extent(data_->get(), &length) >= 0;
  const Hdf5Handle to = select_range(data_->get(), written_, count);
  const Hdf5Handle from = memory_of(count);
  if (!is_extended || H5Dwrite(data_->get(), H5T_NATIVE_INT64, from.get(), to.get(), H5P_DEFAULT, held_.data()) < 0) {
    throw SystemFault(name_ + ": /start_ns cannot be written (is the disk full?)");
  }
  written_ += count;
  held_.clear();
}

void StartsWriter::close() {
  const bool is_closed = data_->close();
  const bool is_done = is_complete_ || H5Ldelete(file_, "start_ns", H5P_DEFAULT) >= 0;
  if (!is_closed || !is_done) throw SystemFault(name_ + ": /start_ns cannot be written (is the disk full?)");
}

}  // namespace cistern
