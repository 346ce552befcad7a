// SPDX-License-Identifier: MIT
// All loops for one instruction set, put together.
#pragma once

#include "pic/force_loops.hpp"
#include "pic/push_loops.hpp"
#include "pic/scatter_loops.hpp"
#include "pic/sum_loops.hpp"

namespace spokewright {

template <class Lanes>
constexpr ParticleKernel kernel_of() {
    return {PushLoops<Lanes>::push, ScatterLoops<Lanes>::scatter, SumLoops<Lanes>::kinetic, SumLoops<Lanes>::turning,
            ForceLoops<Lanes>::tabulate};
}

}  // namespace spokewright
