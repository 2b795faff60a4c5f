#pragma once
/// \file
/// An HDF5 trace file open for reading, and the shape of its /codes. Internal to traces/files: shows hdf5.h.
#include <filesystem>
#include <string>

#include "traces/files/hdf5_handles.hpp"
#include "traces/files/slab_reader.hpp"

namespace cistern {

struct Hdf5Codes {
  std::int64_t traces{0};
  std::int64_t channels{0};
  std::int64_t samples{0};
  bool is_unsigned{false};
  SlabSize chunk{1, 1};  ///< (1, 1) when the codes are not in chunks
};

/// InputError unless it is an HDF5 file.
[[nodiscard]] Hdf5Handle open_hdf5_file(const std::filesystem::path& path);

/// InputError for a file on which HDF5 crashes.
[[noreturn]] void refuse_damaged_hdf5(const std::filesystem::path& path);

/// /codes, with a cache of bounded size for its chunks. InputError when there is none.
[[nodiscard]] Hdf5Handle open_hdf5_codes(const Hdf5Handle& file, const std::string& name);

/// InputError unless /codes is of 16-bit integers with three dimensions, in chunks that can be unpacked
/// in little memory.
[[nodiscard]] Hdf5Codes examine_hdf5_codes(const Hdf5Handle& codes, const std::string& name);

}  // namespace cistern
