/// \file
/// HDF5: /codes (traces, channels, samples), attributes, optional /start_ns and /truth.
#include <fmt/format.h>

#include <cmath>

#include "traces/files/file_facts.hpp"
#include "traces/files/formats.hpp"
#include "traces/files/hdf5_handles.hpp"

namespace cistern {
namespace fs = std::filesystem;
namespace {

/// A chunk that somebody wrote larger than this would have to be held whole to be read.
constexpr std::uint64_t largest_chunk_bytes = 64ULL << 20;

Hdf5Handle open_file(const fs::path& path) {
  Hdf5Handle file(H5Fopen(path.c_str(), H5F_ACC_RDONLY, H5P_DEFAULT), H5Fclose);
  if (!file.is_open()) throw InputError(path.string(), "is no HDF5 file, or a damaged one");
  return file;
}

class Hdf5Reader : public TraceReader {
 public:
  explicit Hdf5Reader(const fs::path& path) : name_(path.string()), file_(open_file(path)), codes_(open_codes()) {
    read_shape();
    read_facts();
    read_starts();
  }

  [[nodiscard]] const TraceFileInfo& info() const override { return info_; }
  void expect_bits(std::int32_t bits) override {
    if (!info_.bits) bits_ = bits;
  }

  bool next(std::size_t max_samples, TraceBlock& block) override {
    if (trace_ == *info_.traces) return false;
    const Hdf5Silence silence;
    const std::size_t count = std::min(max_samples, info_.samples - static_cast<std::size_t>(sample_));
    held_.resize(info_.channels, count);
    const hsize_t start[3] = {static_cast<hsize_t>(trace_), 0, static_cast<hsize_t>(sample_)};
    const hsize_t shape[3] = {1, info_.channels, count};
    const Hdf5Handle from(H5Dget_space(codes_.get()), H5Sclose);
    const Hdf5Handle to(H5Screate_simple(3, shape, nullptr), H5Sclose);
    const bool selected = H5Sselect_hyperslab(from.get(), H5S_SELECT_SET, start, nullptr, shape, nullptr) >= 0;
    // Unsigned codes beyond int16 are clipped to its largest value by HDF5, which 15 bits allow: they
    // are looked for before.
    if (!selected || (is_unsigned_ && !fits(from, to, count)) || H5Dread(codes_.get(), H5T_NATIVE_INT16, to.get(), from.get(), H5P_DEFAULT, held_.channel(0).data()) < 0) {
      throw InputError(fmt::format("{}: trace {}, sample {}", name_, trace_, sample_), "/codes cannot be read; the file is damaged");
    }
    block = {trace_, sample_, sample_ + static_cast<std::int64_t>(count) == static_cast<std::int64_t>(info_.samples), {}, held_.view()};
    if (!starts_.empty()) block.start_ns = starts_[static_cast<std::size_t>(trace_)];
    check_codes(name_, block, bits_);
    sample_ += static_cast<std::int64_t>(count);
    if (block.last_of_trace) {
      ++trace_;
      sample_ = 0;
    }
    return true;
  }

 private:
  Hdf5Handle open_codes() const {
    const Hdf5Silence silence;
    Hdf5Handle codes(H5Dopen2(file_.get(), "/codes", H5P_DEFAULT), H5Dclose);
    if (!codes.is_open()) throw InputError(name_, "has no dataset /codes; expected it, int16 or uint16 (traces, channels, samples)");
    return codes;
  }

  void read_shape() {
    const Hdf5Handle type(H5Dget_type(codes_.get()), H5Tclose);
    if (H5Tget_class(type.get()) != H5T_INTEGER || H5Tget_size(type.get()) != 2) throw InputError(name_, "/codes is not of 16-bit integers; expected int16 or uint16");
    is_unsigned_ = H5Tget_sign(type.get()) == H5T_SGN_NONE;
    const Hdf5Handle space(H5Dget_space(codes_.get()), H5Sclose);
    hsize_t shape[3] = {};
    if (H5Sget_simple_extent_ndims(space.get()) != 3) throw InputError(name_, "/codes has not three dimensions; expected (traces, channels, samples)");
    H5Sget_simple_extent_dims(space.get(), shape, nullptr);
    if (shape[0] < 1 || shape[1] < 1 || shape[2] < 1) throw InputError(name_, fmt::format("/codes has shape ({}, {}, {}), expected at least 1 of each", shape[0], shape[1], shape[2]));
    check_channels(name_, static_cast<std::int64_t>(shape[1]));
    info_.traces = static_cast<std::int64_t>(shape[0]);
    info_.channels = shape[1];
    info_.samples = shape[2];
    check_chunks();
  }

  void check_chunks() const {
    const Hdf5Handle properties(H5Dget_create_plist(codes_.get()), H5Pclose);
    hsize_t chunk[3] = {1, 1, 1};
    if (H5Pget_layout(properties.get()) != H5D_CHUNKED) return;
    H5Pget_chunk(properties.get(), 3, chunk);
    if (chunk[0] * chunk[1] * chunk[2] * 2 > largest_chunk_bytes) {
      throw InputError(name_, fmt::format("/codes has chunks of ({}, {}, {}), expected at most 64 MiB each", chunk[0], chunk[1], chunk[2]));
    }
  }

  std::optional<double> number(const char* name) const {
    const auto values = read_numbers_attribute(file_.get(), name_, name);
    if (!values) return {};
    if (values->size() != 1) throw InputError(name_, fmt::format("attribute {} has {} values, expected one", name, values->size()));
    return values->front();
  }

  std::optional<std::vector<double>> numbers(const char* name) const {
    auto values = read_numbers_attribute(file_.get(), name_, name);
    if (!values) return {};
    values = one_per_channel(name_, name, std::move(*values), info_.channels);
    for (const double value : *values) {
      if (!std::isfinite(value)) throw InputError(name_, fmt::format("attribute {} is {}, expected finite numbers", name, value));
    }
    return values;
  }

  void read_facts() {
    const Hdf5Silence silence;
    info_.sample_rate_mhz = number("sample_rate_mhz");
    if (info_.sample_rate_mhz) check_rate(name_, *info_.sample_rate_mhz);
    if (const auto bits = number("bits")) {
      if (*bits != std::floor(*bits)) throw InputError(name_, fmt::format("attribute bits is {}, expected a whole number", *bits));
      check_bits(name_, static_cast<std::int64_t>(*bits));
      info_.bits = static_cast<std::int32_t>(*bits);
    }
    bits_ = info_.bits.value_or(15);
    if (const auto baselines = numbers("baseline_counts")) {
      info_.baseline_counts.emplace();
      for (const double baseline : *baselines) {
        if (baseline != std::floor(baseline) || baseline < 0 || baseline > 32767) throw InputError(name_, fmt::format("attribute baseline_counts holds {}, expected whole numbers from 0 to 32767", baseline));
        info_.baseline_counts->push_back(static_cast<std::int32_t>(baseline));
      }
    }
    info_.height_counts_per_vem = numbers("height_counts_per_vem");
    info_.area_counts_per_vem = numbers("area_counts_per_vem");
    info_.live_time_s = number("live_time_s");
    if (info_.live_time_s) check_live_time(name_, *info_.live_time_s);
    info_.selection = read_text_attribute(file_.get(), name_, "selection");
    if (info_.selection) check_selection(name_, *info_.selection);
    info_.contiguous = number("contiguous").value_or(0) != 0;
  }

  void read_starts() {
    const Hdf5Silence silence;
    if (H5Lexists(file_.get(), "start_ns", H5P_DEFAULT) <= 0) return;
    const Hdf5Handle data(H5Dopen2(file_.get(), "/start_ns", H5P_DEFAULT), H5Dclose);
    const Hdf5Handle type(H5Dget_type(data.get()), H5Tclose);
    const Hdf5Handle space(H5Dget_space(data.get()), H5Sclose);
    const bool good = data.is_open() && H5Tget_class(type.get()) == H5T_INTEGER && H5Tget_size(type.get()) == 8 && H5Tget_sign(type.get()) == H5T_SGN_2 &&
                      H5Sget_simple_extent_ndims(space.get()) == 1 && H5Sget_simple_extent_npoints(space.get()) == *info_.traces;
    if (!good) throw InputError(name_, fmt::format("/start_ns is not one int64 per trace ({} of them)", *info_.traces));
    starts_.resize(static_cast<std::size_t>(*info_.traces));
    if (H5Dread(data.get(), H5T_NATIVE_INT64, H5S_ALL, H5S_ALL, H5P_DEFAULT, starts_.data()) < 0) throw InputError(name_, "/start_ns cannot be read; the file is damaged");
  }

  bool fits(const Hdf5Handle& from, const Hdf5Handle& to, std::size_t count) const {
    std::vector<std::uint16_t> codes(info_.channels * count);
    if (H5Dread(codes_.get(), H5T_NATIVE_UINT16, to.get(), from.get(), H5P_DEFAULT, codes.data()) < 0) return false;
    for (std::size_t i = 0; i < codes.size(); ++i) {
      if (codes[i] <= 32767) continue;
      throw InputError(fmt::format("{}: trace {}, channel {}, sample {}", name_, trace_, i / count, sample_ + static_cast<std::int64_t>(i % count)), fmt::format("code is {}, expected 0 to 32767", codes[i]));
    }
    return true;
  }

  std::string name_;
  Hdf5Silence silence_;
  Hdf5Handle file_;
  Hdf5Handle codes_;
  TraceFileInfo info_;
  bool is_unsigned_{false};
  std::int32_t bits_{15};
  std::vector<std::int64_t> starts_;
  std::int64_t trace_{0};
  std::int64_t sample_{0};
  Codes held_;
};

struct TruthList {
  hid_t group;
  std::string file;
  std::vector<TruthColumn> columns;
  std::string fault;
};

herr_t read_truth_column(hid_t group, const char* name, const H5L_info_t*, void* data) {
  auto& list = *static_cast<TruthList*>(data);
  const Hdf5Handle column(H5Dopen2(group, name, H5P_DEFAULT), H5Dclose);
  const Hdf5Handle space(H5Dget_space(column.get()), H5Sclose);
  const hssize_t count = column.is_open() ? H5Sget_simple_extent_npoints(space.get()) : -1;
  if (count < 0) {
    list.fault = name;
    return -1;
  }
  TruthColumn truth{name, "", std::vector<double>(static_cast<std::size_t>(count))};
  try {
    truth.unit = read_text_attribute(column.get(), list.file, "unit").value_or("");
  } catch (const InputError&) {
    list.fault = name;
    return -1;
  }
  if (H5Dread(column.get(), H5T_NATIVE_DOUBLE, H5S_ALL, H5S_ALL, H5P_DEFAULT, truth.values.data()) < 0) {
    list.fault = name;
    return -1;
  }
  list.columns.push_back(std::move(truth));
  return 0;
}

}  // namespace

std::vector<TruthColumn> read_truth(const fs::path& path) {
  const Hdf5Silence silence;
  const Hdf5Handle file = open_file(path);
  if (H5Lexists(file.get(), "truth", H5P_DEFAULT) <= 0) return {};
  const Hdf5Handle group(H5Gopen2(file.get(), "/truth", H5P_DEFAULT), H5Gclose);
  TruthList list{group.get(), path.string(), {}, {}};
  hsize_t index = 0;
  if (!group.is_open() || H5Literate(group.get(), H5_INDEX_NAME, H5_ITER_INC, &index, read_truth_column, &list) < 0) {
    throw InputError(path.string(), fmt::format("/truth/{} is no column of numbers with a text attribute `unit`", list.fault));
  }
  return list.columns;
}

std::unique_ptr<TraceReader> open_hdf5(const fs::path& path) {
  const Hdf5Silence silence;
  return std::make_unique<Hdf5Reader>(path);
}

}  // namespace cistern
