#include "traces/files/npy_header.hpp"

#include <fmt/format.h>

#include <charconv>
#include <optional>

#include "traces/base/errors.hpp"
#include "traces/files/file_facts.hpp"

namespace cistern {
namespace {

constexpr std::string_view magic{"\x93NUMPY\x01\x00", 8};
constexpr std::size_t prefix_size = 10;  // magic, version, length of the dictionary
constexpr std::size_t alignment = 64;    // of the first code, as the format asks for

/// Splits "{'key': value, ...}" where the brackets are balanced. Values stay text.
class Dictionary {
 public:
  Dictionary(std::string name, std::string_view text) : name_(std::move(name)), rest_(text) {
    take('{');
    for (skip_blanks(); !rest_.empty() && rest_.front() != '}'; skip_blanks()) {
      const std::string_view key = take_value(':');
      take(':');
      const std::string_view value = take_value(',');
      if (!rest_.empty() && rest_.front() == ',') rest_.remove_prefix(1);
      keep(key, value);
    }
    take('}');
    skip_blanks();
    if (!rest_.empty()) throw fault();
    if (!descr || !fortran_order || !shape) throw fault();
  }

  std::optional<std::string_view> descr;
  std::optional<std::string_view> fortran_order;
  std::optional<std::string_view> shape;

 private:
  [[nodiscard]] InputError fault() const {
    return {name_ + ": NPY header", "is not a dictionary of 'descr', 'fortran_order' and 'shape' alone, as expected"};
  }

  void skip_blanks() {
    const auto at = rest_.find_first_not_of(" \n");
    rest_.remove_prefix(std::min(at, rest_.size()));
  }

  void take(char c) {
    skip_blanks();
    if (rest_.empty() || rest_.front() != c) throw fault();
    rest_.remove_prefix(1);
  }

  /// Up to `end` or the closing bracket of the dictionary, without blanks around it.
  std::string_view take_value(char end) {
    skip_blanks();
    int depth = 0;
    std::size_t length = 0;
    for (; length < rest_.size(); ++length) {
      const char c = rest_[length];
      if (depth == 0 && (c == end || c == '}')) break;
      depth += c == '(' || c == '[' || c == '{' ? 1 : 0;
      depth -= c == ')' || c == ']' || c == '}' ? 1 : 0;
    }
    const std::string_view value = rest_.substr(0, length);
    rest_.remove_prefix(length);
    return value.substr(0, value.find_last_not_of(" \n") + 1);
  }

  void keep(std::string_view key, std::string_view value) {
    auto& known = key == "'descr'" ? descr : key == "'fortran_order'" ? fortran_order : shape;
    if (known || (&known == &shape && key != "'shape'")) throw fault();
    known = value;
  }

  std::string name_;
  std::string_view rest_;
};

bool read_is_unsigned(const std::string& name, std::string_view descr) {
  if (descr == "'<i2'") return false;
  if (descr == "'<u2'") return true;
  const bool is_big_endian = descr.size() > 1 && descr[1] == '>';
  throw InputError(name + ": NPY header",
                   fmt::format("descr is {}{}, expected '<i2' or '<u2' (16-bit integers, little-endian)",
                               in_quotes(descr), is_big_endian ? ", which is big-endian" : ""));
}

std::array<std::int64_t, 3> read_shape(const std::string& name, std::string_view text) {
  const InputError fault(
      name + ": NPY header",
      fmt::format("shape is {}, expected three dimensions (traces, channels, samples)", in_quotes(text)));
  std::array<std::int64_t, 3> shape{};
  const char* at = text.data();
  const char* const end = at + text.size();
  const auto take = [&](char c) {
    if (at == end || *at != c) throw fault;
    ++at;
  };
  take('(');
  for (std::size_t d = 0; d < shape.size(); ++d) {
    while (at != end && *at == ' ') ++at;
    const auto [next, error] = std::from_chars(at, end, shape[d]);
    if (error != std::errc{}) throw fault;
    at = next;
    if (d + 1 < shape.size()) take(',');
  }
  if (at != end && *at == ',') ++at;
  take(')');
  if (at != end) throw fault;
  check_shape(name + ": NPY header", "the array", shape[0], shape[1], shape[2]);
  return shape;
}

void check_size(const InputFile& file, const NpyHeader& header) {
  std::int64_t bytes = 2;
  bool is_too_large = false;
  for (const std::int64_t length : header.shape) is_too_large |= __builtin_mul_overflow(bytes, length, &bytes);
  is_too_large |= __builtin_add_overflow(bytes, header.data_start, &bytes);
  const std::int64_t size = file.size();
  if (!is_too_large && bytes == size) return;
  const std::string expected = is_too_large ? "more than any file holds" : fmt::to_string(bytes);
  throw InputError(file.name(), fmt::format("has {} bytes, expected {} for its shape ({}, {}, {})", size, expected,
                                            header.shape[0], header.shape[1], header.shape[2]));
}

}  // namespace

NpyHeader read_npy_header(const InputFile& file) {
  char prefix[prefix_size] = {};
  const std::string_view start(prefix, file.read_some(prefix, prefix_size, 0));
  if (start.substr(0, 6) != magic.substr(0, 6)) {
    throw InputError(file.name(), "does not start as an NPY file does; expected NumPy format 1.0");
  }
  if (start.size() == prefix_size && start.substr(0, 8) != magic) {
    throw InputError(file.name(),
                     fmt::format("is of NPY format {}.{}, expected 1.0", static_cast<unsigned char>(prefix[6]),
                                 static_cast<unsigned char>(prefix[7])));
  }
  const std::size_t length = static_cast<unsigned char>(prefix[8]) + 256U * static_cast<unsigned char>(prefix[9]);
  std::string text(length, ' ');
  if (start.size() < prefix_size || file.read_some(text.data(), length, prefix_size) < length) {
    throw InputError(file.name() + ": NPY header", fmt::format("ends early, expected {} bytes", prefix_size + length));
  }
  const Dictionary dictionary(file.name(), text);
  NpyHeader header{
      read_is_unsigned(file.name(), *dictionary.descr), {}, static_cast<std::int64_t>(prefix_size + length)};
  if (*dictionary.fortran_order != "False") {
    throw InputError(file.name() + ": NPY header", fmt::format("fortran_order is {}, expected False (C order)",
                                                               in_quotes(*dictionary.fortran_order)));
  }
  header.shape = read_shape(file.name(), *dictionary.shape);
  check_size(file, header);
  return header;
}

std::string npy_head(const std::array<std::int64_t, 3>& shape) {
  std::string dictionary =
      fmt::format("{{'descr': '<i2', 'fortran_order': False, 'shape': ({}, {}, {}), }}", shape[0], shape[1], shape[2]);
  const std::size_t size = (prefix_size + dictionary.size() + 1 + alignment - 1) / alignment * alignment;
  dictionary.resize(size - prefix_size - 1, ' ');
  dictionary += '\n';
  std::string head(magic);
  head += static_cast<char>(dictionary.size() % 256);
  head += static_cast<char>(dictionary.size() / 256);
  return head + dictionary;
}

}  // namespace cistern
