#pragma once
/// \file
/// Unit results as bytes between processes of one run: plain values of one machine, in order.
#include <cstring>
#include <string>
#include <string_view>
#include <type_traits>
#include <vector>

#include "traces/base/errors.hpp"

namespace cistern {

class Packer {
 public:
  template <typename Value>
  void put(const Value& value) {
    static_assert(std::is_trivially_copyable_v<Value>);
    bytes_.append(reinterpret_cast<const char*>(&value), sizeof value);
  }
  template <typename Value>
  void put_all(const std::vector<Value>& values) {
    static_assert(std::is_trivially_copyable_v<Value>);
    put(static_cast<std::uint64_t>(values.size()));
    if (!values.empty()) bytes_.append(reinterpret_cast<const char*>(values.data()), values.size() * sizeof(Value));
  }
  [[nodiscard]] std::string take() { return std::move(bytes_); }

 private:
  std::string bytes_;
};

/// Reads back in the same order. Reading past the end is a bug.
class Unpacker {
 public:
  explicit Unpacker(std::string_view bytes) : rest_(bytes) {}
  template <typename Value>
  [[nodiscard]] Value get() {
    CISTERN_ASSERT(rest_.size() >= sizeof(Value));
    Value value;
    std::memcpy(&value, rest_.data(), sizeof value);
    rest_.remove_prefix(sizeof value);
    return value;
  }
  template <typename Value>
  [[nodiscard]] std::vector<Value> get_all() {
    std::vector<Value> values(get<std::uint64_t>());
    CISTERN_ASSERT(rest_.size() >= values.size() * sizeof(Value));
    if (!values.empty()) std::memcpy(values.data(), rest_.data(), values.size() * sizeof(Value));
    rest_.remove_prefix(values.size() * sizeof(Value));
    return values;
  }

 private:
  std::string_view rest_;
};

}  // namespace cistern
