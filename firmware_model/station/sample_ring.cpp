#include "firmware_model/station/sample_ring.hpp"

#include "traces/base/errors.hpp"

namespace cistern {

SampleRing::SampleRing(std::size_t channels, std::int64_t length)
    : codes_(channels, static_cast<std::size_t>(length)), length_(length) {
  CISTERN_ASSERT(length >= 1);
}

void SampleRing::store(std::span<const std::int16_t> codes) {
  CISTERN_ASSERT(codes.size() == codes_.channels());
  const auto place = static_cast<std::size_t>(stored_ % length_);
  for (std::size_t c = 0; c < codes.size(); ++c) codes_.channel(c)[place] = codes[c];
  ++stored_;
}

void SampleRing::copy_from(std::int64_t first, Codes& into) const {
  CISTERN_ASSERT(first >= oldest() && first <= stored_);
  for (std::size_t c = 0; c < codes_.channels(); ++c) {
    const auto from = codes_.view().channel(c);
    const auto to = into.channel(c);
    for (std::int64_t s = first; s < stored_; ++s) {
      to[static_cast<std::size_t>(s - first)] = from[static_cast<std::size_t>(s % length_)];
    }
  }
}

}  // namespace cistern
