#pragma once
/// \file
/// What already lies in a directory that a run wants.
#include <filesystem>

#include "bench/results/run_directory.hpp"

namespace cistern {

[[nodiscard]] bool holds_something(const std::filesystem::path& directory);

/// InputError when `path` is a file.
void refuse_file(const std::filesystem::path& path);

/// InputError unless `directory` holds a run of `wanted` and nothing else: its files would be lost. Leaves it as it is.
void refuse_strangers(const std::filesystem::path& directory, const RunIdentity& wanted);

}  // namespace cistern
