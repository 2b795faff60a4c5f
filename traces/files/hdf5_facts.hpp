#pragma once
/// \file
/// What the attributes of an HDF5 file say about its traces. Internal to traces/files: shows hdf5.h.
#include <string>

#include "traces/files/hdf5_handles.hpp"
#include "traces/files/trace_file.hpp"

namespace cistern {

/// Reads the attributes of the file or of /codes, wherever they stand; where both say something it must
/// be the same. InputError for values outside the contract, and for names that are nearly ours: a
/// misspelt selection must not pass as none. Other attributes are nobody's business.
/// \param name  of the file
/// \param info  `channels` is set
void read_hdf5_facts(hid_t file, hid_t codes, const std::string& name, TraceFileInfo& info);

/// Writes all that `info` says to the object.
void write_hdf5_facts(hid_t object, const std::string& name, const TraceFileInfo& info);

}  // namespace cistern
