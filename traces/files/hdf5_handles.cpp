#include "traces/files/hdf5_handles.hpp"

#include <fmt/format.h>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

std::optional<Hdf5Handle> open_attribute(hid_t object, const char* name) {
  if (H5Aexists(object, name) <= 0) return {};
  return Hdf5Handle(H5Aopen(object, name, H5P_DEFAULT), H5Aclose);
}

std::string read_variable_text(const Hdf5Handle& attribute, const Hdf5Handle& type) {
  char* text = nullptr;
  if (H5Aread(attribute.get(), type.get(), &text) < 0 || text == nullptr) return {};
  std::string copy(text);
  H5free_memory(text);
  return copy;
}

std::string read_fixed_text(const Hdf5Handle& attribute, const Hdf5Handle& type) {
  std::string text(H5Tget_size(type.get()), '\0');
  if (H5Aread(attribute.get(), type.get(), text.data()) < 0) return {};
  text.resize(std::min(text.find('\0'), text.size()));
  return text;
}

}  // namespace

std::optional<std::vector<double>> read_numbers_attribute(hid_t object, const std::string& place, const char* name) {
  const auto attribute = open_attribute(object, name);
  if (!attribute) return {};
  const Hdf5Handle type(H5Aget_type(attribute->get()), H5Tclose);
  const H5T_class_t kind = H5Tget_class(type.get());
  const Hdf5Handle space(H5Aget_space(attribute->get()), H5Sclose);
  const hssize_t count = H5Sget_simple_extent_npoints(space.get());
  const bool is_number = kind == H5T_INTEGER || kind == H5T_FLOAT || kind == H5T_ENUM;
  if (!is_number || count < 1 || count > 16) throw InputError(place, fmt::format("attribute {} is no number or list of 1 to 16 numbers", name));
  std::vector<double> values(static_cast<std::size_t>(count));
  // HDF5 keeps booleans (as Python writes them) as an enumeration of int8.
  const Hdf5Handle base(kind == H5T_ENUM ? H5Tget_super(type.get()) : H5Tcopy(type.get()), H5Tclose);
  if (kind == H5T_ENUM) {
    std::vector<std::int8_t> bytes(values.size());
    if (H5Tget_size(type.get()) != 1 || H5Aread(attribute->get(), type.get(), bytes.data()) < 0) throw InputError(place, fmt::format("attribute {} cannot be read", name));
    values.assign(bytes.begin(), bytes.end());
  } else if (H5Aread(attribute->get(), H5T_NATIVE_DOUBLE, values.data()) < 0) {
    throw InputError(place, fmt::format("attribute {} cannot be read", name));
  }
  return values;
}

std::optional<std::string> read_text_attribute(hid_t object, const std::string& place, const char* name) {
  const auto attribute = open_attribute(object, name);
  if (!attribute) return {};
  const Hdf5Handle type(H5Aget_type(attribute->get()), H5Tclose);
  const Hdf5Handle space(H5Aget_space(attribute->get()), H5Sclose);
  if (H5Tget_class(type.get()) != H5T_STRING || H5Sget_simple_extent_npoints(space.get()) != 1) {
    throw InputError(place, fmt::format("attribute {} is no text", name));
  }
  return H5Tis_variable_str(type.get()) > 0 ? read_variable_text(*attribute, type) : read_fixed_text(*attribute, type);
}

void write_numbers_attribute(hid_t object, const char* name, const std::vector<double>& values) {
  const hsize_t count = values.size();
  const Hdf5Handle space(count == 1 ? H5Screate(H5S_SCALAR) : H5Screate_simple(1, &count, nullptr), H5Sclose);
  const Hdf5Handle attribute(H5Acreate2(object, name, H5T_IEEE_F64LE, space.get(), H5P_DEFAULT, H5P_DEFAULT), H5Aclose);
  if (!attribute.is_open() || H5Awrite(attribute.get(), H5T_NATIVE_DOUBLE, values.data()) < 0) {
    throw SystemFault(fmt::format("cannot write HDF5 attribute {}", name));
  }
}

void write_text_attribute(hid_t object, const char* name, const std::string& text) {
  const Hdf5Handle type(H5Tcopy(H5T_C_S1), H5Tclose);
  H5Tset_size(type.get(), text.size() + 1);
  H5Tset_cset(type.get(), H5T_CSET_UTF8);
  const Hdf5Handle space(H5Screate(H5S_SCALAR), H5Sclose);
  const Hdf5Handle attribute(H5Acreate2(object, name, type.get(), space.get(), H5P_DEFAULT, H5P_DEFAULT), H5Aclose);
  if (!attribute.is_open() || H5Awrite(attribute.get(), type.get(), text.c_str()) < 0) {
    throw SystemFault(fmt::format("cannot write HDF5 attribute {}", name));
  }
}

}  // namespace cistern
