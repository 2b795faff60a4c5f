#pragma once
/// \file
/// The particles of a test signal.
#include <vector>

#include "traces/base/random.hpp"
#include "traces/generator/generator.hpp"
#include "traces/generator/light_source.hpp"
#include "traces/tank/cylinder.hpp"

namespace cistern {

/// Particles of one signal whose mean photo-electrons add up to its size exactly. The first starts at
/// time 0, the others later; times are in samples.
[[nodiscard]] std::vector<LightSource> draw_light_sources(const TestSignal& signal, const GeneratorConfig& config,
                                                          RandomStream& stream);

/// Mean photo-electrons, all tubes, of a signal of 1 VEM.
[[nodiscard]] double photo_electrons_per_vem(const TankConfig& tank);

}  // namespace cistern
