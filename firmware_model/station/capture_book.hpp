#pragma once
/// \file
/// Which firing gets a capture buffer, and for how long a station has none: pure arithmetic on
/// sample numbers, told firing by firing. Rules in words: docs/station.md.
#include <array>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace cistern {

/// What a firing inside an open capture (one that still waits for samples) does.
enum class OverlapPolicy {
  Ignore,     ///< nothing more: the open capture holds it
  Extend,     ///< prolongs the open capture, up to max_samples
  NewBuffer,  ///< takes a buffer of its own; captures may overlap
};

/// "ignore", "extend", "new_buffer".
[[nodiscard]] std::string_view name_of(OverlapPolicy policy);

/// The policy of a word above; empty for any other word.
[[nodiscard]] std::optional<OverlapPolicy> overlap_policy_named(std::string_view word);

/// The numbers of the defaults are invented.
struct CaptureConfig {
  std::int64_t pre_samples{120};        ///< samples before the firing, >= 0
  std::int64_t post_samples{480};       ///< samples from the firing on, its own included, >= 1
  std::int32_t buffers{4};              ///< places to hold a capture, >= 1
  std::int64_t copy_out_samples{2000};  ///< clocks to copy pre + post samples out, >= 0; more take longer in proportion
  OverlapPolicy overlap{OverlapPolicy::Ignore};
  std::int64_t max_samples{2400};  ///< length of a buffer, >= pre + post: the limit of Extend
};

/// One line that names the key and what was expected of it; empty when the configuration is valid.
[[nodiscard]] std::optional<std::string> fault_of(const CaptureConfig& config);

enum class CaptureOutcome {
  Captured,      ///< opened a capture of its own
  Merged,        ///< inside an open capture, which stays as it is
  Extended,      ///< inside an open capture, which now ends later
  NoFreeBuffer,  ///< lost
};

inline constexpr std::size_t capture_outcome_count = 4;

/// "captured", "merged", "extended", "no_free_buffer".
[[nodiscard]] std::string_view name_of(CaptureOutcome outcome);

/// The stretch [first_sample, end_sample) around a firing, and the buffer that holds it.
struct Capture {
  std::int64_t firing_sample{0};  ///< of the firing that opened it
  std::int64_t first_sample{0};   ///< firing - pre, at least 0
  std::int64_t end_sample{0};     ///< firing + post (later when extended): the first sample not in it
  std::int64_t copied_from{0};    ///< the clock at which copy-out begins
  std::int64_t free_at{0};        ///< a firing at this sample may use the buffer again
  std::int32_t buffer{0};         ///< 0 to buffers - 1
  bool operator==(const Capture&) const = default;
};

struct CaptureDecision {
  CaptureOutcome outcome{CaptureOutcome::NoFreeBuffer};
  std::optional<std::size_t> capture;  ///< number in captures() of the one that holds the firing
  bool operator==(const CaptureDecision&) const = default;
};

/// Books the firings of one station in order. Captures are copied out one after the other, in the
/// order in which they end (one bus). Copyable, so that a state can be kept and gone back to.
class CaptureBook {
 public:
  explicit CaptureBook(CaptureConfig config);  ///< Bug if fault_of(config).

  /// \param firing_sample  not before the previous one. A second firing in the same sample goes
  ///                       with the first: merged into its capture, or lost like it.
  CaptureDecision take(std::int64_t firing_sample);

  /// True when a firing at `sample` would find a buffer, open captures aside.
  /// \param sample  not before the last firing; at its own sample: whether another one is left.
  [[nodiscard]] bool has_free_buffer(std::int64_t sample) const;

  /// Samples in [0, end) at which a firing would find no free buffer. The firing that takes the
  /// last buffer found it, so its own sample does not count. \param end  after the last firing.
  [[nodiscard]] std::int64_t busy_samples(std::int64_t end) const;

  /// Those of busy_samples(end) at which a firing would be lost: not inside an open capture that
  /// takes it in. Equal to busy_samples under NewBuffer.
  [[nodiscard]] std::int64_t dead_samples(std::int64_t end) const;

  [[nodiscard]] const std::vector<Capture>& captures() const noexcept { return captures_; }
  [[nodiscard]] std::int64_t count(CaptureOutcome outcome) const;
  [[nodiscard]] const CaptureConfig& config() const noexcept { return config_; }

 private:
  /// A sum of samples that is complete up to the last firing.
  struct Stretches {
    std::int64_t busy{0};
    std::int64_t dead{0};
  };
  [[nodiscard]] std::optional<CaptureDecision> join_open_capture(std::int64_t firing_sample);
  [[nodiscard]] CaptureDecision open_capture(std::int64_t firing_sample);
  [[nodiscard]] bool extend_to(std::int64_t end_sample);
  void schedule_copy_out(Capture& capture);
  [[nodiscard]] std::int64_t earliest_free_at() const;
  [[nodiscard]] std::int64_t open_until() const;
  [[nodiscard]] Stretches since_last_firing(std::int64_t end) const;

  CaptureConfig config_;
  std::vector<Capture> captures_;
  std::vector<std::int64_t> buffer_free_at_;
  std::int64_t bus_free_at_{0};  ///< when the bus has copied all captures but the last
  std::int64_t last_firing_{-1};
  Stretches until_last_firing_;
  CaptureDecision last_decision_;
  std::array<std::int64_t, capture_outcome_count> counts_{};
};

}  // namespace cistern
