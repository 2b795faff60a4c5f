#pragma once
/// \file
/// boxcar_sum: sliding sums of baseline-subtracted samples. Internal to the kernel.
#include <vector>

#include "firmware_model/trigger/condition_kernel.hpp"

namespace cistern {

class SumCondition : public ConditionKernel {
 public:
  explicit SumCondition(const ConditionSettings& settings);
  [[nodiscard]] std::unique_ptr<ConditionKernel> clone() const override { return std::make_unique<SumCondition>(*this); }
  void reset() override;
  [[nodiscard]] bool process(const CodesView& piece, PieceWords& condition) override;
  [[nodiscard]] std::int64_t onset(std::int64_t sample) const override;

 private:
  struct Channel {
    std::size_t index{0};
    std::int16_t baseline{0};
    std::int64_t needed{0};
    std::int64_t sum{0};                      ///< of the window that ends before the word at hand
    /// The last `length_` codes before the piece, then the piece's first ones, then 63 for a word
    /// that reaches past the end. A sample before the start of a trace holds the baseline: it adds 0.
    std::vector<std::int16_t> codes;
  };
  /// 64 samples of one channel.
  struct Word {
    const std::int16_t* entering;
    const std::int16_t* leaving;
    unsigned samples;
  };

  [[nodiscard]] Word word_of(const Channel& channel, const CodesView& piece, std::size_t first) const;
  [[nodiscard]] std::uint64_t condition_of_word(const CodesView& piece, std::size_t first);

  std::int32_t length_;
  std::int32_t majority_;
  std::vector<Channel> channels_;
  std::int64_t seen_{0};                      ///< samples before the piece at hand, since the reset
  std::size_t last_samples_{0};
};

}  // namespace cistern
