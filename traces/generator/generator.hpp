#pragma once
/// \file
/// Synthetic traces of one station: dense background (muons and electronic noise, every sample of
/// live time) and test signals of chosen size and spread. Physics and limits: docs/physics.md.
/// Pure: all numbers come from counter-based streams, so that any stretch can be made alone.
#include <cstdint>
#include <memory>
#include <string_view>
#include <vector>

#include "traces/base/random.hpp"
#include "traces/frontend/frontend_config.hpp"
#include "traces/particles/muon_config.hpp"
#include "traces/tank/tank_config.hpp"
#include "traces/waveform/waveform.hpp"

namespace cistern {

/// Everything that shapes the traces of one station.
struct GeneratorConfig {
  TankConfig tank;
  MuonConfig muons;
  FrontendConfig frontend;
  double sample_rate_mhz{100};
};

enum class SignalKind { Muon, Electromagnetic, Shower };
[[nodiscard]] std::string_view name_of(SignalKind kind);  ///< "muon", "electromagnetic", "shower"

/// One signal placed on purpose.
struct TestSignal {
  SignalKind kind{SignalKind::Muon};
  double size_vem{1};   ///< true size: mean photo-electrons over photo-electrons per VEM, all tubes
  double spread_ns{0};  ///< 10 to 90 % of the particles' arrival times; 0: all at once
};

/// Makes traces of one station. Immutable once made; calls with the same arguments give the same
/// samples, whatever was called before.
class TraceGenerator {
 public:
  TraceGenerator(const GeneratorConfig& config, std::uint64_t campaign_seed);
  ~TraceGenerator();
  TraceGenerator(const TraceGenerator&) = delete;
  TraceGenerator& operator=(const TraceGenerator&) = delete;

  /// Dense background, samples [first_sample, first_sample + samples) of the station's live time.
  /// However the live time is cut into calls, the samples are the same.
  void make_background(std::uint32_t station, std::int64_t first_sample, std::size_t samples, Waveform& waveform) const;

  /// A trace with one test signal and noise but no background particles. The first light of the
  /// signal's first particle falls at `onset_sample` (within one sample).
  /// \param number  the signal's number: same number, same trace
  /// \return the mean number of photo-electrons (all tubes) that the signal was given
  double make_signal(const TestSignal& signal, std::uint64_t number, std::size_t samples, std::int64_t onset_sample,
                     Waveform& waveform) const;

  /// A trace of one vertical muon through the centre of the tank, without noise, for calibration.
  void make_vertical_muon(std::uint64_t number, std::size_t samples, std::int64_t onset_sample,
                          Waveform& waveform) const;

  /// Background muons per second that cross the water above the configured momentum limit.
  [[nodiscard]] double muon_rate_hz() const;

 private:
  struct Model;
  std::unique_ptr<const Model> model_;
};

/// Pulse height and area of vertical, central muons, per channel: the VEM of the calibration.
struct VemCalibration {
  std::vector<double> height_counts;  ///< mean peak of the pulse above baseline, counts
  std::vector<double> height_error;   ///< standard error of the mean
  std::vector<double> area_counts;    ///< mean sum above baseline, counts x samples
  std::vector<double> area_error;
};
[[nodiscard]] VemCalibration calibrate(const TraceGenerator& generator, std::size_t channels, int muons);

}  // namespace cistern
