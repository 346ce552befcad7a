// SPDX-License-Identifier: MIT
#include "pic/kernel_lanes.hpp"
#include "pic/lanes_avx512.hpp"

namespace spokewright {

extern const ParticleKernel kAvx512Kernel;
const ParticleKernel kAvx512Kernel = ParticleLoops<Avx512Lanes>::kernel();

}  // namespace spokewright
