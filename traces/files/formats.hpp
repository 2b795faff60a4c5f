#pragma once
/// \file
/// The readers and writers behind open_trace_file and create_trace_file. Internal to traces/files.
#include "traces/files/posix_file.hpp"
#include "traces/files/trace_file.hpp"

namespace cistern {

[[nodiscard]] std::unique_ptr<TraceReader> open_csv(const std::filesystem::path& path);
[[nodiscard]] std::unique_ptr<TraceReader> open_npy(const std::filesystem::path& path);
[[nodiscard]] std::unique_ptr<TraceReader> open_hdf5(const std::filesystem::path& path);

/// Writers to `file`, which they do not publish. The caller has checked the blocks: their channels, and
/// that all traces have `info.samples`. `finish` gets one truth value per trace in each column.
[[nodiscard]] std::unique_ptr<TraceWriter> create_csv(const TemporaryFile& file, const TraceFileInfo& info);
[[nodiscard]] std::unique_ptr<TraceWriter> create_npy(const TemporaryFile& file, const TraceFileInfo& info);
[[nodiscard]] std::unique_ptr<TraceWriter> create_hdf5(const TemporaryFile& file, const TraceFileInfo& info);

}  // namespace cistern
