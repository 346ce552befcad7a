// SPDX-License-Identifier: MIT
#include "pic/kernel_lanes.hpp"
#include "pic/lanes_avx2.hpp"

namespace spokewright {

extern const ParticleKernel kAvx2Kernel;
const ParticleKernel kAvx2Kernel = ParticleLoops<Avx2Lanes>::kernel();

}  // namespace spokewright
