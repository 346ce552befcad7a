// SPDX-License-Identifier: MIT
#include "pic/kernel_loops.hpp"
#include "pic/lanes_avx512.hpp"

namespace spokewright {

extern const ParticleKernel kAvx512Kernel;
const ParticleKernel kAvx512Kernel = kernel_of<Avx512Lanes>();

}  // namespace spokewright
