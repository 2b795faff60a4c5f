#include "traces/files/hdf5_file.hpp"

#include <fmt/format.h>

#include "traces/base/errors.hpp"
#include "traces/files/file_facts.hpp"

namespace cistern {
namespace {

/// Packed chunks are unpacked whole; HDF5 then holds them up to three times over.
constexpr std::uint64_t largest_packed_chunk = 32ULL << 20;
/// For chunks of many long traces, which one slab cannot hold; others are read once only.
constexpr std::size_t cache_bytes = 32ULL << 20;
constexpr std::size_t cache_slots = 10'007;  // a prime well above the chunks held, as the HDF5 manual advises

std::int64_t signed_length(hsize_t length) {
  return length > static_cast<hsize_t>(INT64_MAX) ? INT64_MAX : static_cast<std::int64_t>(length);
}

SlabSize read_chunk(const Hdf5Handle& codes, const std::string& name) {
  const Hdf5Handle properties(H5Dget_create_plist(codes.get()), H5Pclose);
  const H5D_layout_t layout = H5Pget_layout(properties.get());
  if (layout == H5D_VIRTUAL || H5Pget_external_count(properties.get()) > 0) {
    throw InputError(name + ": /codes", "lies in other files, expected the codes in this one");
  }
  if (layout != H5D_CHUNKED) return {1, 1};
  hsize_t chunk[3] = {};
  if (H5Pget_chunk(properties.get(), 3, chunk) != 3) {
    throw InputError(name + ": /codes", "has unreadable chunks, expected an undamaged file");
  }
  std::uint64_t bytes = 2;
  bool is_too_large = false;
  for (const hsize_t length : chunk) is_too_large |= __builtin_mul_overflow(bytes, std::uint64_t{length}, &bytes);
  is_too_large |= bytes > largest_packed_chunk && H5Pget_nfilters(properties.get()) > 0;
  if (is_too_large) {
    throw InputError(name + ": /codes", fmt::format("is packed in chunks of ({}, {}, {}), expected at most {} MiB each",
                                                    chunk[0], chunk[1], chunk[2], largest_packed_chunk >> 20));
  }
  return {signed_length(chunk[0]), signed_length(chunk[2])};
}

}  // namespace

Hdf5Handle open_hdf5_file(const std::filesystem::path& path) {
  prepare_hdf5();
  if (H5Fis_hdf5(path.c_str()) == 0) {
    throw InputError(path.string(), "does not start as an HDF5 file does; expected HDF5 with a dataset /codes");
  }
  Hdf5Handle file(H5Fopen(path.c_str(), H5F_ACC_RDONLY, H5P_DEFAULT), H5Fclose);
  if (!file.is_open()) refuse_damaged_hdf5(path);
  return file;
}

void refuse_damaged_hdf5(const std::filesystem::path& path) {
  throw InputError(path.string(), "cannot be read, expected an undamaged HDF5 file");
}

Hdf5Handle open_hdf5_codes(const Hdf5Handle& file, const std::string& name) {
  const Hdf5Handle access(H5Pcreate(H5P_DATASET_ACCESS), H5Pclose);
  H5Pset_chunk_cache(access.get(), cache_slots, cache_bytes, H5D_CHUNK_CACHE_W0_DEFAULT);
  Hdf5Handle codes(H5Dopen2(file.get(), "/codes", access.get()), H5Dclose);
  if (!codes.is_open()) {
    throw InputError(name, "has no dataset /codes, expected int16 or uint16 (traces, channels, samples)");
  }
  return codes;
}

Hdf5Codes examine_hdf5_codes(const Hdf5Handle& codes, const std::string& name) {
  const std::string place = name + ": /codes";
  const Hdf5Handle type(H5Dget_type(codes.get()), H5Tclose);
  if (H5Tget_class(type.get()) != H5T_INTEGER || H5Tget_size(type.get()) != 2) {
    throw InputError(place, "is not of 16-bit integers, expected int16 or uint16");
  }
  const Hdf5Handle space(H5Dget_space(codes.get()), H5Sclose);
  const int dimensions = H5Sget_simple_extent_ndims(space.get());
  if (dimensions != 3) {
    throw InputError(place, fmt::format("has {} dimensions, expected three (traces, channels, samples)", dimensions));
  }
  hsize_t shape[3] = {};
  H5Sget_simple_extent_dims(space.get(), shape, nullptr);
  Hdf5Codes result{signed_length(shape[0]),
                   signed_length(shape[1]),
                   signed_length(shape[2]),
                   H5Tget_sign(type.get()) == H5T_SGN_NONE,
                   {1, 1}};
  check_shape(place, "the array", result.traces, result.channels, result.samples);
  result.chunk = read_chunk(codes, name);
  return result;
}

}  // namespace cistern
