#pragma once
/// \file
/// The header of an NPY file, format 1.0 (NumPy's own documentation, "numpy.lib.format"): magic, version,
/// length, and a Python dictionary with 'descr', 'fortran_order' and 'shape'. Internal to traces/files.
#include <array>
#include <cstdint>
#include <string>
#include <string_view>

#include "traces/files/posix_file.hpp"

namespace cistern {

struct NpyHeader {
  bool is_unsigned{false};
  std::array<std::int64_t, 3> shape{};  ///< traces, channels, samples
  std::int64_t data_start{0};           ///< bytes before the first code
};

/// InputError unless it is format 1.0 with 16-bit integers in C order, three dimensions, and exactly as
/// many bytes as these need.
[[nodiscard]] NpyHeader read_npy_header(const InputFile& file);

/// All bytes before the codes of an int16 array.
[[nodiscard]] std::string npy_head(const std::array<std::int64_t, 3>& shape);

}  // namespace cistern
