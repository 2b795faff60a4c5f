#include "traces/files/hdf5_attributes.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "traces/base/errors.hpp"
#include "traces/files/file_facts.hpp"

namespace cistern {
namespace {

constexpr std::size_t longest_text = 4'096;

[[noreturn]] void refuse(const std::string& place, const std::string& name, const char* expected) {
  throw InputError(place, fmt::format("attribute {} cannot be read, expected {}", name, expected));
}

std::optional<Hdf5Handle> open_attribute(hid_t object, const std::string& place, const std::string& name) {
  if (H5Aexists(object, name.c_str()) <= 0) return {};
  Hdf5Handle attribute(H5Aopen(object, name.c_str(), H5P_DEFAULT), H5Aclose);
  if (!attribute.is_open()) refuse(place, name, "an undamaged one");
  return attribute;
}

hssize_t size_of(const Hdf5Handle& attribute) {
  const Hdf5Handle space(H5Aget_space(attribute.get()), H5Sclose);
  return H5Sget_simple_extent_npoints(space.get());
}

/// HDF5 keeps booleans as an enumeration of int8, which it does not turn into numbers by itself.
bool read_booleans(const Hdf5Handle& attribute, const Hdf5Handle& type, std::vector<double>& values) {
  std::vector<std::int8_t> bytes(values.size());
  if (H5Tget_size(type.get()) != 1 || H5Aread(attribute.get(), type.get(), bytes.data()) < 0) return false;
  values.assign(bytes.begin(), bytes.end());
  return true;
}

std::optional<std::string> read_variable_text(const Hdf5Handle& attribute, const Hdf5Handle& type) {
  char* text = nullptr;
  if (H5Aread(attribute.get(), type.get(), &text) < 0) return {};
  std::string copy(text == nullptr ? "" : text);
  H5free_memory(text);
  return copy;
}

std::optional<std::string> read_fixed_text(const Hdf5Handle& attribute, const Hdf5Handle& type) {
  const std::size_t size = H5Tget_size(type.get());
  if (size > longest_text) return {};
  std::string text(size, '\0');
  if (H5Aread(attribute.get(), type.get(), text.data()) < 0) return {};
  text.resize(std::min(text.find('\0'), text.size()));
  if (H5Tget_strpad(type.get()) == H5T_STR_SPACEPAD) text.erase(text.find_last_not_of(' ') + 1);
  return text;
}

void write_attribute(hid_t object, const std::string& place, const char* name, hid_t file_type, hid_t memory_type,
                     std::size_t count, const void* values) {
  const hsize_t length = count;
  const Hdf5Handle space(count == 1 ? H5Screate(H5S_SCALAR) : H5Screate_simple(1, &length, nullptr), H5Sclose);
  const Hdf5Handle attribute(H5Acreate2(object, name, file_type, space.get(), H5P_DEFAULT, H5P_DEFAULT), H5Aclose);
  if (!attribute.is_open() || H5Awrite(attribute.get(), memory_type, values) < 0) {
    throw SystemFault(fmt::format("{}: attribute {} cannot be written (is the disk full?)", place, name));
  }
}

}  // namespace

std::optional<std::vector<double>> read_numbers_attribute(hid_t object, const std::string& place,
                                                          const std::string& name) {
  const auto attribute = open_attribute(object, place, name);
  if (!attribute) return {};
  const Hdf5Handle type(H5Aget_type(attribute->get()), H5Tclose);
  const H5T_class_t kind = H5Tget_class(type.get());
  const hssize_t count = size_of(*attribute);
  if (count < 1 || count > 16) refuse(place, name, "one number or a list of at most 16");
  std::vector<double> values(static_cast<std::size_t>(count));
  const bool is_number = kind == H5T_INTEGER || kind == H5T_FLOAT;
  const bool is_read = is_number ? H5Aread(attribute->get(), H5T_NATIVE_DOUBLE, values.data()) >= 0
                                 : kind == H5T_ENUM && read_booleans(*attribute, type, values);
  if (!is_read) refuse(place, name, "numbers");
  return values;
}

std::optional<std::string> read_text_attribute(hid_t object, const std::string& place, const std::string& name) {
  const auto attribute = open_attribute(object, place, name);
  if (!attribute) return {};
  const Hdf5Handle type(H5Aget_type(attribute->get()), H5Tclose);
  if (H5Tget_class(type.get()) != H5T_STRING || size_of(*attribute) != 1) refuse(place, name, "one text");
  auto text =
      H5Tis_variable_str(type.get()) > 0 ? read_variable_text(*attribute, type) : read_fixed_text(*attribute, type);
  if (!text) refuse(place, name, "one short text");
  return text;
}

std::vector<std::string> attribute_names(hid_t object, const std::string& place) {
  std::vector<std::string> names;
  H5O_info_t facts{};
  if (H5Oget_info2(object, &facts, H5O_INFO_NUM_ATTRS) < 0)
    throw InputError(place, "cannot be read, expected attributes");
  for (hsize_t i = 0; i < facts.num_attrs; ++i) {
    char name[64] = {};  // longer ones are cut, and are none of ours
    if (H5Aget_name_by_idx(object, ".", H5_INDEX_NAME, H5_ITER_INC, i, name, sizeof name, H5P_DEFAULT) < 0) {
      throw InputError(place, "cannot be read, expected undamaged attributes");
    }
    names.emplace_back(name);
  }
  return names;
}

void write_numbers_attribute(hid_t object, const std::string& place, const char* name,
                             const std::vector<double>& values) {
  write_attribute(object, place, name, H5T_IEEE_F64LE, H5T_NATIVE_DOUBLE, values.size(), values.data());
}

void write_integers_attribute(hid_t object, const std::string& place, const char* name,
                              const std::vector<std::int32_t>& values) {
  write_attribute(object, place, name, H5T_STD_I32LE, H5T_NATIVE_INT32, values.size(), values.data());
}

void write_flag_attribute(hid_t object, const std::string& place, const char* name, bool value) {
  const Hdf5Handle type(H5Tenum_create(H5T_STD_I8LE), H5Tclose);
  const std::int8_t numbers[] = {0, 1};
  H5Tenum_insert(type.get(), "FALSE", &numbers[0]);
  H5Tenum_insert(type.get(), "TRUE", &numbers[1]);
  write_attribute(object, place, name, type.get(), type.get(), 1, &numbers[value ? 1 : 0]);
}

void write_text_attribute(hid_t object, const std::string& place, const char* name, const std::string& text) {
  const Hdf5Handle type(H5Tcopy(H5T_C_S1), H5Tclose);
  H5Tset_size(type.get(), text.size() + 1);
  H5Tset_cset(type.get(), H5T_CSET_UTF8);
  write_attribute(object, place, name, type.get(), type.get(), 1, text.c_str());
}

}  // namespace cistern
