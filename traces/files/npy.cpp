/// \file
/// NPY, format 1.0: int16 or uint16 (little-endian), C order, shape (traces, channels, samples).
/// A block is read channel by channel with pread, so that one very long trace needs little memory.
#include <fcntl.h>
#include <fmt/format.h>
#include <unistd.h>

#include <cerrno>
#include <charconv>
#include <cstring>
#include <fstream>

#include "traces/files/file_facts.hpp"
#include "traces/files/formats.hpp"

namespace cistern {
namespace fs = std::filesystem;
namespace {

constexpr std::string_view magic{"\x93NUMPY\x01\x00", 8};
constexpr std::size_t prefix_size = 10;

struct NpyHeader {
  bool is_unsigned{false};
  std::int64_t shape[3]{};
  std::int64_t data_start{0};
};

/// The value of a key in the header's dictionary, up to the next top-level comma.
std::string value_of(const std::string& file, const std::string& header, const std::string& key) {
  const auto at = header.find("'" + key + "'");
  const auto colon = at == std::string::npos ? at : header.find(':', at);
  if (colon == std::string::npos) throw InputError(file, fmt::format("NPY header has no '{}'; expected 'descr', 'fortran_order' and 'shape'", key));
  int depth = 0;
  auto end = colon + 1;
  for (; end < header.size(); ++end) {
    const char c = header[end];
    if (c == '(') ++depth;
    if (c == ')') --depth;
    if ((c == ',' && depth == 0) || c == '}') break;
  }
  std::string value = header.substr(colon + 1, end - colon - 1);
  value.erase(0, value.find_first_not_of(" \t"));
  value.erase(value.find_last_not_of(" \t") + 1);
  return value;
}

bool read_type(const std::string& file, const std::string& text) {
  if (text == "'<i2'") return false;
  if (text == "'<u2'") return true;
  throw InputError(file, fmt::format("NPY type is {}, expected '<i2' or '<u2' (16-bit integers, little-endian)", text.substr(0, 40)));
}

void read_shape(const std::string& file, const std::string& text, NpyHeader& header) {
  const auto fail = [&]() -> InputError { return {file, fmt::format("NPY shape is {}, expected (traces, channels, samples), each at least 1", text.substr(0, 60))}; };
  const char* at = text.data();
  const char* end = text.data() + text.size();
  if (at == end || *at++ != '(') throw fail();
  for (std::int64_t& length : header.shape) {
    while (at != end && (*at == ' ' || *at == ',')) ++at;
    const auto [next, error] = std::from_chars(at, end, length);
    if (error != std::errc{} || length < 1 || length > (std::int64_t{1} << 46)) throw fail();
    at = next;
  }
  while (at != end && (*at == ' ' || *at == ',')) ++at;
  if (at + 1 != end || *at != ')') throw fail();
}

class File {
 public:
  explicit File(const fs::path& path) : name_(path.string()), descriptor_(::open(path.c_str(), O_RDONLY | O_CLOEXEC)) {
    if (descriptor_ < 0) throw InputError(name_, fmt::format("cannot be read ({})", std::strerror(errno)));
  }
  ~File() { ::close(descriptor_); }
  File(const File&) = delete;
  File& operator=(const File&) = delete;

  void read(void* to, std::size_t bytes, std::int64_t from) const {
    auto* next = static_cast<char*>(to);
    while (bytes > 0) {
      const ssize_t got = ::pread(descriptor_, next, bytes, from);
      if (got < 0 && errno == EINTR) continue;
      if (got < 0) throw SystemFault(fmt::format("{}: {}", name_, std::strerror(errno)));
      if (got == 0) throw InputError(name_, "ends early; expected as many samples as its header says");
      next += got;
      from += got;
      bytes -= static_cast<std::size_t>(got);
    }
  }

 private:
  std::string name_;
  int descriptor_;
};

class NpyReader : public TraceReader {
 public:
  explicit NpyReader(const fs::path& path) : name_(path.string()), file_(path) {
    read_header(static_cast<std::int64_t>(fs::file_size(path)));
    info_.traces = header_.shape[0];
    info_.channels = static_cast<std::size_t>(header_.shape[1]);
    info_.samples = static_cast<std::size_t>(header_.shape[2]);
  }

  [[nodiscard]] const TraceFileInfo& info() const override { return info_; }
  void expect_bits(std::int32_t bits) override { bits_ = bits; }

  bool next(std::size_t max_samples, TraceBlock& block) override {
    if (trace_ == header_.shape[0]) return false;
    const std::size_t count = std::min<std::size_t>(max_samples, info_.samples - static_cast<std::size_t>(sample_));
    codes_.resize(info_.channels, count);
    for (std::size_t c = 0; c < info_.channels; ++c) read_channel(c, codes_.channel(c));
    block = {trace_, sample_, sample_ + static_cast<std::int64_t>(count) == header_.shape[2], {}, codes_.view()};
    check_codes(name_, block, bits_);
    sample_ += static_cast<std::int64_t>(count);
    if (block.last_of_trace) {
      ++trace_;
      sample_ = 0;
    }
    return true;
  }

 private:
  void read_header(std::int64_t size) {
    char prefix[prefix_size] = {};
    if (size < static_cast<std::int64_t>(prefix_size)) throw InputError(name_, "is no NPY file: too short; expected NumPy format 1.0");
    file_.read(prefix, prefix_size, 0);
    if (std::string_view(prefix, 6) != magic.substr(0, 6)) throw InputError(name_, "is no NPY file: it does not start as one; expected NumPy format 1.0");
    if (std::string_view(prefix, 8) != magic) throw InputError(name_, fmt::format("is NPY format {}.{}, expected 1.0", static_cast<unsigned char>(prefix[6]), static_cast<unsigned char>(prefix[7])));
    const std::size_t length = static_cast<unsigned char>(prefix[8]) + 256U * static_cast<unsigned char>(prefix[9]);
    header_.data_start = static_cast<std::int64_t>(prefix_size + length);
    if (size < header_.data_start) throw InputError(name_, "ends inside its NPY header");
    std::string text(length, ' ');
    file_.read(text.data(), length, prefix_size);
    for (char& c : text) {
      if (static_cast<unsigned char>(c) < 0x20) c = ' ';
    }
    header_.is_unsigned = read_type(name_, value_of(name_, text, "descr"));
    if (const std::string order = value_of(name_, text, "fortran_order"); order != "False") {
      throw InputError(name_, fmt::format("NPY fortran_order is {}, expected False (C order)", order.substr(0, 20)));
    }
    read_shape(name_, value_of(name_, text, "shape"), header_);
    check_channels(name_, header_.shape[1]);
    check_size(size);
  }

  void check_size(std::int64_t size) const {
    // Exact: a file's size is below 2^63, and a product that large in floating point never equals it.
    const long double product = static_cast<long double>(header_.shape[0]) * header_.shape[1] * header_.shape[2] * 2 + header_.data_start;
    if (product == static_cast<long double>(size)) return;
    throw InputError(name_, fmt::format("has {} bytes, expected {:.0f} by its shape ({}, {}, {})", size, product, header_.shape[0], header_.shape[1], header_.shape[2]));
  }

  void read_channel(std::size_t channel, std::span<std::int16_t> codes) const {
    const std::int64_t first = (trace_ * header_.shape[1] + static_cast<std::int64_t>(channel)) * header_.shape[2] + sample_;
    file_.read(codes.data(), codes.size_bytes(), header_.data_start + 2 * first);
    if (!header_.is_unsigned) return;
    for (std::size_t s = 0; s < codes.size(); ++s) {
      if (codes[s] >= 0) continue;
      throw InputError(fmt::format("{}: trace {}, channel {}, sample {}", name_, trace_, channel, sample_ + static_cast<std::int64_t>(s)),
                       fmt::format("code is {}, expected 0 to 32767", static_cast<std::uint16_t>(codes[s])));
    }
  }

  std::string name_;
  File file_;
  NpyHeader header_;
  TraceFileInfo info_;
  std::int32_t bits_{15};
  std::int64_t trace_{0};
  std::int64_t sample_{0};
  Codes codes_;
};

class NpyWriter : public TraceWriter {
 public:
  NpyWriter(const fs::path& path, const TraceFileInfo& info) : name_(path.string()), info_(info), stream_(path, std::ios::binary | std::ios::trunc) {
    CISTERN_ASSERT(info.traces.has_value());
    std::string header = fmt::format("{{'descr': '<i2', 'fortran_order': False, 'shape': ({}, {}, {}), }}", *info.traces, info.channels, info.samples);
    const std::size_t padded = (prefix_size + header.size() + 1 + 63) / 64 * 64;
    header.resize(padded - prefix_size - 1, ' ');
    header += '\n';
    const char length[2] = {static_cast<char>(header.size() % 256), static_cast<char>(header.size() / 256)};
    stream_ << magic;
    stream_.write(length, 2);
    stream_ << header;
    data_start_ = static_cast<std::int64_t>(padded);
  }

  void append(const TraceBlock& block) override {
    CISTERN_ASSERT(block.codes.channels() == info_.channels && traces_ < *info_.traces);
    for (std::size_t c = 0; c < info_.channels; ++c) {
      const auto codes = block.codes.channel(c);
      const std::int64_t first = (traces_ * static_cast<std::int64_t>(info_.channels) + static_cast<std::int64_t>(c)) * static_cast<std::int64_t>(info_.samples) + sample_;
      stream_.seekp(data_start_ + 2 * first);
      stream_.write(reinterpret_cast<const char*>(codes.data()), static_cast<std::streamsize>(codes.size_bytes()));
    }
    if (!stream_) throw SystemFault(name_ + ": cannot write (is the disk full?)");
    sample_ += static_cast<std::int64_t>(block.codes.samples());
    if (!block.last_of_trace) return;
    CISTERN_ASSERT(sample_ == static_cast<std::int64_t>(info_.samples));
    ++traces_;
    sample_ = 0;
  }

  void finish(const std::vector<TruthColumn>&) override {
    CISTERN_ASSERT(traces_ == *info_.traces);
    stream_.close();
    if (stream_.fail()) throw SystemFault(name_ + ": cannot write (is the disk full?)");
  }

 private:
  std::string name_;
  TraceFileInfo info_;
  std::ofstream stream_;
  std::int64_t data_start_{0};
  std::int64_t traces_{0};
  std::int64_t sample_{0};
};

}  // namespace

std::unique_ptr<TraceReader> open_npy(const fs::path& path) { return std::make_unique<NpyReader>(path); }

std::unique_ptr<TraceWriter> create_npy(const fs::path& temporary, const TraceFileInfo& info) { return std::make_unique<NpyWriter>(temporary, info); }

}  // namespace cistern
