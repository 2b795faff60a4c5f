#pragma once
/// \file
/// /start_ns of an HDF5 file, a piece at a time: a file may hold a hundred million short traces.
/// Internal to traces/files: shows hdf5.h.
#include <cstdint>
#include <optional>
#include <string>
#include <vector>

#include "traces/base/time.hpp"
#include "traces/files/hdf5_handles.hpp"

namespace cistern {

class StartsReader {
 public:
  /// InputError unless /start_ns is absent or one int64 per trace.
  StartsReader(hid_t file, std::string name, std::int64_t traces);
  [[nodiscard]] std::optional<GpsNanoseconds> start_of(std::int64_t trace);

 private:
  std::string name_;
  std::int64_t traces_;
  std::optional<Hdf5Handle> data_;
  std::int64_t first_{0};  ///< trace of the first one held
  std::vector<std::int64_t> held_;
};

/// Keeps the starts of all traces; forgets them once a trace has none.
class StartsWriter {
 public:
  StartsWriter(hid_t file, std::string name) : file_(file), name_(std::move(name)) {}
  void add(std::optional<GpsNanoseconds> start_ns);
  void finish();
  /// Leaves HDF5 alone from now on.
  void abandon() noexcept {
    if (data_) data_->abandon();
  }

 private:
  void flush();
  void close();

  hid_t file_;
  std::string name_;
  std::optional<Hdf5Handle> data_;
  bool is_complete_{true};
  std::int64_t written_{0};
  std::vector<std::int64_t> held_;
};

}  // namespace cistern
