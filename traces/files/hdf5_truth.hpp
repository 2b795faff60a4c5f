#pragma once
/// \file
/// The group /truth of an HDF5 file. Internal to traces/files: shows hdf5.h.
#include <string>
#include <vector>

#include "traces/files/hdf5_handles.hpp"
#include "traces/files/trace_file.hpp"

namespace cistern {

/// SystemFault when it cannot be written.
void write_hdf5_truth(hid_t file, const std::string& name, const std::vector<TruthColumn>& truth);

}  // namespace cistern
