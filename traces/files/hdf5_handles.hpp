#pragma once
/// \file
/// Owners of HDF5 identifiers. Internal to traces/files: shows hdf5.h.
#include <hdf5.h>

#include <utility>

namespace cistern {

/// Closes an identifier with the function for its kind.
class Hdf5Handle {
 public:
  using Close = herr_t (*)(hid_t);
  Hdf5Handle(hid_t id, Close close_with) : id_(id), close_(close_with) {}
  ~Hdf5Handle() { (void)close(); }
  Hdf5Handle(Hdf5Handle&& other) noexcept : id_(std::exchange(other.id_, H5I_INVALID_HID)), close_(other.close_) {}
  Hdf5Handle& operator=(Hdf5Handle&& other) noexcept {
    std::swap(id_, other.id_);
    std::swap(close_, other.close_);
    return *this;
  }

  [[nodiscard]] bool is_open() const noexcept { return id_ >= 0; }
  [[nodiscard]] hid_t get() const noexcept { return id_; }
  /// False when HDF5 could not write what was left.
  [[nodiscard]] bool close() noexcept {
    const hid_t id = std::exchange(id_, H5I_INVALID_HID);
    return id < 0 || close_(id) >= 0;
  }
  /// Leaves it open for good.
  void abandon() noexcept { id_ = H5I_INVALID_HID; }

 private:
  hid_t id_;
  Close close_;
};

/// Before anything else is asked of HDF5: it prints no errors of its own in this thread, and does not
/// close at exit what a failed disk has made impossible to close. It is ours alone, so nobody misses either.
inline void prepare_hdf5() {
  H5dont_atexit();
  H5Eset_auto2(H5E_DEFAULT, nullptr, nullptr);
}

}  // namespace cistern
