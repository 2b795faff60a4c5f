#pragma once
/// \file
/// Owners of HDF5 identifiers, and attributes as values. Internal to traces/files: shows hdf5.h.
#include <hdf5.h>

#include <optional>
#include <string>
#include <utility>
#include <vector>

namespace cistern {

/// Closes an identifier with the function for its kind.
class Hdf5Handle {
 public:
  using Close = herr_t (*)(hid_t);
  Hdf5Handle(hid_t id, Close close) : id_(id), close_(close) {}
  ~Hdf5Handle() {
    if (id_ >= 0) close_(id_);
  }
  Hdf5Handle(Hdf5Handle&& other) noexcept : id_(std::exchange(other.id_, -1)), close_(other.close_) {}
  Hdf5Handle& operator=(Hdf5Handle&& other) noexcept {
    std::swap(id_, other.id_);
    std::swap(close_, other.close_);
    return *this;
  }
  [[nodiscard]] bool is_open() const noexcept { return id_ >= 0; }
  [[nodiscard]] hid_t get() const noexcept { return id_; }

 private:
  hid_t id_;
  Close close_;
};

/// HDF5 prints no errors of its own for as long as this lives.
class Hdf5Silence {
 public:
  Hdf5Silence() {
    H5Eget_auto2(H5E_DEFAULT, &function_, &data_);
    H5Eset_auto2(H5E_DEFAULT, nullptr, nullptr);
  }
  ~Hdf5Silence() { H5Eset_auto2(H5E_DEFAULT, function_, data_); }
  Hdf5Silence(const Hdf5Silence&) = delete;
  Hdf5Silence& operator=(const Hdf5Silence&) = delete;

 private:
  H5E_auto2_t function_{nullptr};
  void* data_{nullptr};
};

/// Attributes of a file or dataset; absent ones are nothing. InputError at `place` for a wrong type.
[[nodiscard]] std::optional<std::vector<double>> read_numbers_attribute(hid_t object, const std::string& place, const char* name);
[[nodiscard]] std::optional<std::string> read_text_attribute(hid_t object, const std::string& place, const char* name);

void write_numbers_attribute(hid_t object, const char* name, const std::vector<double>& values);
void write_text_attribute(hid_t object, const char* name, const std::string& text);

}  // namespace cistern
