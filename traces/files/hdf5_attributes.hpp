#pragma once
/// \file
/// HDF5 attributes as values. Internal to traces/files: shows hdf5.h.
#include <optional>
#include <string>
#include <vector>

#include "traces/files/hdf5_handles.hpp"

namespace cistern {

/// Nothing when there is no such attribute. InputError at `place` for a wrong type.
/// One number or a list of up to 16; booleans, as Python writes them, are 0 and 1.
[[nodiscard]] std::optional<std::vector<double>> read_numbers_attribute(hid_t object, const std::string& place,
                                                                        const std::string& name);
[[nodiscard]] std::optional<std::string> read_text_attribute(hid_t object, const std::string& place,
                                                             const std::string& name);
[[nodiscard]] std::vector<std::string> attribute_names(hid_t object, const std::string& place);

/// SystemFaults at `place` when the disk fails. A list of one becomes a single number.
void write_numbers_attribute(hid_t object, const std::string& place, const char* name,
                             const std::vector<double>& values);
void write_integers_attribute(hid_t object, const std::string& place, const char* name,
                              const std::vector<std::int32_t>& values);
void write_flag_attribute(hid_t object, const std::string& place, const char* name, bool value);
void write_text_attribute(hid_t object, const std::string& place, const char* name, const std::string& text);

}  // namespace cistern
