#pragma once
/// \file
/// The station's memory: the ring buffer, the capture buffers and their copy-out, sample by sample. CaptureBook
/// decides; here the samples are really moved. Pure logic; the clocked wrapper is station_module.hpp.
#include <cstddef>
#include <cstdint>
#include <optional>
#include <span>
#include <string>
#include <vector>

#include "firmware_model/station/capture_book.hpp"
#include "firmware_model/station/sample_ring.hpp"
#include "traces/waveform/codes.hpp"

namespace cistern {

struct StationCapture {
  Capture span;
  bool complete{false};  ///< false: the run ended before the capture did
  Codes codes;           ///< samples [first_sample, end_sample), fewer when not complete
};

/// One line that names the key and what was expected: the ring holds the pre-samples and the firing's own.
[[nodiscard]] std::optional<std::string> fault_of_ring(std::int64_t ring_samples, const CaptureConfig& config);

class CaptureUnit {
 public:
  /// Bug if fault_of(config) or fault_of_ring(ring_samples, config).
  CaptureUnit(const CaptureConfig& config, std::size_t channels, std::int64_t ring_samples);

  /// Stores the next sample: frees the buffers that are copied out by then, then fills the open captures.
  void store(std::span<const std::int16_t> codes);

  /// A firing in the sample stored last.
  CaptureDecision fire();

  /// Copies out what is left; captures that are still open stay incomplete. \return all captures in order of firing
  [[nodiscard]] std::vector<StationCapture> finish();

  [[nodiscard]] bool is_busy() const noexcept { return occupied_ == buffers_.size(); }  ///< every buffer is taken
  [[nodiscard]] std::int64_t busy_samples() const noexcept { return busy_samples_; }    ///< stored while busy
  [[nodiscard]] const CaptureBook& book() const noexcept { return book_; }

 private:
  struct Buffer {
    std::optional<std::size_t> capture;  ///< number of the capture it holds
    std::int64_t filled{0};              ///< samples written
    Codes codes;
  };
  [[nodiscard]] const Capture& booked(const Buffer& buffer) const { return book_.captures()[*buffer.capture]; }
  void open(std::size_t capture);
  void fill(Buffer& buffer, std::span<const std::int16_t> codes);
  void copy_out(Buffer& buffer);

  CaptureBook book_;
  SampleRing ring_;
  std::vector<Buffer> buffers_;
  std::size_t occupied_{0};
  std::int64_t busy_samples_{0};
  std::vector<StationCapture> copied_out_;
};

}  // namespace cistern
