#pragma once
/// \file
/// Power spectra: the averaged periodogram (Welch 1967) with a Hann window, segments side by side.
#include <cstdint>
#include <span>
#include <vector>

namespace cistern {

/// Power of a real signal, bins 0 to size/2: |sum x w e^-2 pi i k n / size|^2, both halves joined and
/// divided by (size * sum w^2), so that the bins add up to the mean square of a stationary signal.
/// Reads many segments of one length. Copyable, not thread-safe.
class Periodogram {
 public:
  /// \param size  samples of a segment: a power of two, at least 4
  explicit Periodogram(std::size_t size);

  [[nodiscard]] std::size_t size() const noexcept { return window_.size(); }
  /// Adds the power of the segment, less its mean, to `power` (size/2 + 1 bins).
  void add(std::span<const std::int16_t> segment, std::span<double> power);
  /// As it is, with its mean.
  [[nodiscard]] std::vector<double> power_of(std::span<const double> segment);

 private:
  void add_windowed(std::span<double> power);
  void transform();

  std::vector<double> window_;
  double window_power_{0};
  std::vector<double> cosines_;  ///< of 2 pi k / size, k below size/2
  std::vector<double> sines_;
  std::vector<double> real_;  ///< the segment times the window, then its transform
  std::vector<double> imaginary_;
};

}  // namespace cistern
