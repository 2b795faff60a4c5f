#pragma once
/// \file
/// The readers and writers behind open_trace_file and create_trace_file. Internal to traces/files.
#include "traces/files/trace_file.hpp"

namespace cistern {

[[nodiscard]] std::unique_ptr<TraceReader> open_csv(const std::filesystem::path& path);
[[nodiscard]] std::unique_ptr<TraceReader> open_npy(const std::filesystem::path& path);
[[nodiscard]] std::unique_ptr<TraceReader> open_hdf5(const std::filesystem::path& path);

/// Writers write to `temporary`, which the caller renames.
[[nodiscard]] std::unique_ptr<TraceWriter> create_csv(const std::filesystem::path& temporary, const TraceFileInfo& info);
[[nodiscard]] std::unique_ptr<TraceWriter> create_npy(const std::filesystem::path& temporary, const TraceFileInfo& info);
[[nodiscard]] std::unique_ptr<TraceWriter> create_hdf5(const std::filesystem::path& temporary, const TraceFileInfo& info);

}  // namespace cistern
