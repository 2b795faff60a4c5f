#pragma once
/// \file
/// Counter-based random streams: Philox4x32-10 (Salmon, Moraes, Dror, Shaw, SC11), from Random123.
/// A stream is named by (campaign seed, purpose, index), so any number of threads or processes
/// draws the same numbers and a new model never shifts another's draws. The transforms are our
/// own, since those of the standard library differ from one library to the next.
#include <array>
#include <cstdint>

namespace cistern {

/// What the numbers are for. One list; a value is never reused for anything else.
enum class Purpose : std::uint32_t {
  ElectronicNoise = 1,     ///< index: station, channel and block, packed by the noise generator
  MuonArrivals = 2,        ///< index: station and time slice
  MuonTrack = 3,
  PhotoElectrons = 4,
  TestSignal = 5,          ///< index: number of the placed signal
  TestSignalNoise = 6,
  Calibration = 7,
  Demonstration = 8,       ///< `traces make`
  PropertyTest = 9,        ///< tests only
};

/// The raw bijection, for block-wise generators and for the known-answer test.
[[nodiscard]] std::array<std::uint32_t, 4> philox4x32_10(std::array<std::uint32_t, 4> counter,
                                                         std::array<std::uint32_t, 2> key);

/// A sequence of draws. Cheap to make, copyable, not thread-safe.
/// Counter words: draw number, index low, index high, purpose.
class RandomStream {
 public:
  RandomStream(std::uint64_t campaign_seed, Purpose purpose, std::uint64_t index);

  [[nodiscard]] std::uint32_t next_word();
  [[nodiscard]] double uniform();                          ///< in (0, 1), 53 bits, never 0 or 1
  [[nodiscard]] double uniform(double low, double high);
  [[nodiscard]] double exponential(double mean);
  [[nodiscard]] double normal();                           ///< mean 0, standard deviation 1
  /// \param mean >= 0. Inversion below 30, transformed rejection (Hoermann 1993, PTRS) above.
  [[nodiscard]] std::uint32_t poisson(double mean);

 private:
  std::array<std::uint32_t, 4> counter_;
  std::array<std::uint32_t, 2> key_;
  std::array<std::uint32_t, 4> words_{};
  unsigned next_{4};
};

}  // namespace cistern
