// SPDX-License-Identifier: MIT
#include "pic/particle_kernel.hpp"

#include <algorithm>
#include <stdexcept>

namespace spokewright {

extern const ParticleKernel kPlainKernel;
#ifdef SPOKEWRIGHT_X86
extern const ParticleKernel kAvx2Kernel;
extern const ParticleKernel kAvx512Kernel;
#endif

std::vector<InstructionSet> instruction_sets() {
    std::vector<InstructionSet> sets{InstructionSet::plain};
#ifdef SPOKEWRIGHT_X86
    if (__builtin_cpu_supports("avx2") && __builtin_cpu_supports("fma")) {
        sets.push_back(InstructionSet::avx2);
        if (__builtin_cpu_supports("avx512f") && __builtin_cpu_supports("avx512dq")) {
            sets.push_back(InstructionSet::avx512);
        }
    }
#endif
    return sets;
}

InstructionSet fastest_instruction_set() {
    return instruction_sets().back();
}

std::string_view name_of(InstructionSet set) {
    switch (set) {
        case InstructionSet::avx512:
            return "AVX-512";
        case InstructionSet::avx2:
            return "AVX2";
        case InstructionSet::plain:
            break;
    }
    return "plain";
}

const ParticleKernel& particle_kernel(InstructionSet set) {
    const auto sets = instruction_sets();
    if (std::find(sets.begin(), sets.end(), set) == sets.end()) {
        throw std::invalid_argument("particle_kernel: this processor does not run " + std::string(name_of(set)));
    }
#ifdef SPOKEWRIGHT_X86
    if (set == InstructionSet::avx512) {
        return kAvx512Kernel;
    }
    if (set == InstructionSet::avx2) {
        return kAvx2Kernel;
    }
#endif
    return kPlainKernel;
}

}  // namespace spokewright
