// SPDX-License-Identifier: MIT
#include "pic/kernel_loops.hpp"
#include "pic/lanes_avx2.hpp"

namespace spokewright {

extern const ParticleKernel kAvx2Kernel;
const ParticleKernel kAvx2Kernel = kernel_of<Avx2Lanes>();

}  // namespace spokewright
