/// \file
/// HDF5: /codes (traces, channels, samples), attributes, optional /start_ns. Slabs follow the chunks.
#include <fmt/format.h>

#include "traces/base/errors.hpp"
#include "traces/files/formats.hpp"
#include "traces/files/hdf5_facts.hpp"
#include "traces/files/hdf5_file.hpp"
#include "traces/files/hdf5_starts.hpp"
#include "traces/files/rehearsal.hpp"
#include "traces/files/slab_reader.hpp"

namespace cistern {
namespace {

class Hdf5Source : public CodesSource {
 public:
  explicit Hdf5Source(const std::filesystem::path& path)
      : name_(path.string()),
        file_(open_hdf5_file(path)),
        codes_(open_hdf5_codes(file_, name_)),
        shape_(examine_hdf5_codes(codes_, name_)),
        starts_(file_.get(), name_, shape_.traces) {}

  [[nodiscard]] const Hdf5Codes& shape() const noexcept { return shape_; }

  [[nodiscard]] TraceFileInfo info() const {
    TraceFileInfo info;
    info.traces = shape_.traces;
    info.channels = static_cast<std::size_t>(shape_.channels);
    info.samples = static_cast<std::size_t>(shape_.samples);
    read_hdf5_facts(file_.get(), codes_.get(), name_, info);
    return info;
  }

  void fetch(const Slab& slab, std::span<std::int16_t> codes) override {
    prepare_hdf5();
    const hsize_t start[3] = {static_cast<hsize_t>(slab.trace), 0, static_cast<hsize_t>(slab.first_sample)};
    const hsize_t count[3] = {static_cast<hsize_t>(slab.traces), static_cast<hsize_t>(shape_.channels),
                              static_cast<hsize_t>(slab.samples)};
    const Hdf5Handle from(H5Dget_space(codes_.get()), H5Sclose);
    const Hdf5Handle to(H5Screate_simple(3, count, nullptr), H5Sclose);
    // As they are: HDF5 would clip what int16 cannot hold, and nobody would know.
    const hid_t type = shape_.is_unsigned ? H5T_NATIVE_UINT16 : H5T_NATIVE_INT16;
    if (H5Sselect_hyperslab(from.get(), H5S_SELECT_SET, start, nullptr, count, nullptr) < 0 ||
        H5Dread(codes_.get(), type, to.get(), from.get(), H5P_DEFAULT, codes.data()) < 0) {
      throw InputError(fmt::format("{}: trace {}, sample {}", name_, slab.trace, slab.first_sample),
                       "/codes cannot be read, expected an undamaged file");
    }
  }

  [[nodiscard]] std::optional<GpsNanoseconds> start_of(std::int64_t trace) override { return starts_.start_of(trace); }

 private:
  std::string name_;
  Hdf5Handle file_;
  Hdf5Handle codes_;
  Hdf5Codes shape_;
  StartsReader starts_;
};

std::unique_ptr<TraceReader> open_reader(const std::filesystem::path& path) {
  auto source = std::make_unique<Hdf5Source>(path);
  const Hdf5Codes shape = source->shape();
  return std::make_unique<SlabReader>(path.string(), source->info(),
                                      choose_slab(shape.channels, shape.samples, shape.chunk), shape.is_unsigned,
                                      std::move(source));
}

/// All that is read before the first codes, and these.
void read_beginning(const std::filesystem::path& path) {
  TraceBlock block;
  (void)open_reader(path)->next(1, block);
}

}  // namespace

std::unique_ptr<TraceReader> open_hdf5(const std::filesystem::path& path) {
  if (!comes_to_an_end([&] { read_beginning(path); })) refuse_damaged_hdf5(path);
  return open_reader(path);
}

}  // namespace cistern
