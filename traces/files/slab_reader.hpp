#pragma once
/// \file
/// Reads files whose codes can be reached in any order. Slabs of about a megabyte are fetched: several
/// traces when they are short, a piece of one when it is long. The blocks are cut from them, so that
/// neither the number of traces nor the length of one decides how much memory is needed.
/// Internal to traces/files.
#include <span>

#include "traces/files/trace_file.hpp"

namespace cistern {

/// Samples [first_sample, first_sample + samples) of `traces` traces from `trace` on, all channels.
struct Slab {
  std::int64_t trace{0};
  std::int64_t traces{0};
  std::int64_t first_sample{0};
  std::int64_t samples{0};
};

/// How much is fetched at once.
struct SlabSize {
  std::int64_t traces{1};
  std::int64_t samples{1};
};

/// Slabs that hold whole chunks, so that none is unpacked twice, unless the chunks are too large for that.
/// \param chunk  what the file stores together; (1, 1) when it stores no chunks
[[nodiscard]] SlabSize choose_slab(std::int64_t channels, std::int64_t samples, SlabSize chunk);

/// Where the codes come from.
class CodesSource {
 public:
  virtual ~CodesSource() = default;
  /// \param codes  one run per trace and channel, in that order
  virtual void fetch(const Slab& slab, std::span<std::int16_t> codes) = 0;
  /// Of the trace's sample 0.
  [[nodiscard]] virtual std::optional<GpsNanoseconds> start_of(std::int64_t trace) = 0;
};

class SlabReader : public TraceReader {
 public:
  /// \param name         for messages
  /// \param is_unsigned  the source gives uint16, in the bits of int16
  SlabReader(std::string name, TraceFileInfo info, SlabSize size, bool is_unsigned,
             std::unique_ptr<CodesSource> source);

  [[nodiscard]] const TraceFileInfo& info() const override { return info_; }
  void expect_bits(std::int32_t bits) override;
  [[nodiscard]] bool next(std::size_t max_samples, TraceBlock& block) override;

 private:
  void fetch_slab();
  [[nodiscard]] CodesView codes_in_slab(std::int64_t trace) const;

  std::string name_;
  TraceFileInfo info_;
  SlabSize size_;
  bool is_unsigned_;
  std::unique_ptr<CodesSource> source_;
  std::int32_t bits_;
  Slab slab_;
  std::vector<std::int16_t> codes_;
  std::int64_t trace_{0};   ///< of the next block
  std::int64_t sample_{0};  ///< of the next block
};

}  // namespace cistern
