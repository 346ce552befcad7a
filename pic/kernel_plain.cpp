// SPDX-License-Identifier: MIT
#include "pic/kernel_loops.hpp"
#include "pic/lanes_plain.hpp"

namespace spokewright {

extern const ParticleKernel kPlainKernel;
const ParticleKernel kPlainKernel = kernel_of<PlainLanes>();

}  // namespace spokewright
