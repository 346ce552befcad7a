// SPDX-License-Identifier: MIT
#include "pic/kernel_lanes.hpp"
#include "pic/lanes_plain.hpp"

namespace spokewright {

extern const ParticleKernel kPlainKernel;
const ParticleKernel kPlainKernel = ParticleLoops<PlainLanes>::kernel();

}  // namespace spokewright
