// SPDX-License-Identifier: MIT
// Random numbers named by where they are used (seed, step, purpose, place, draw), so that a result depends neither on
// the number of threads nor on a restart. Philox 4x32-10 (J. K. Salmon et al., SC11 (2011)) from Random123.
#pragma once

#include <Random123/philox.h>

#include <array>
#include <cstdint>

namespace spokewright {

enum class Draw : std::uint32_t { emission_count, emission, secondary_count, secondary };

using Uniforms = std::array<float, 5>;

class CounterRandom {
public:
    explicit CounterRandom(std::uint64_t seed)
        : key_{{static_cast<std::uint32_t>(seed), static_cast<std::uint32_t>(seed >> 32)}} {}

    /// Five uniform numbers in (0, 1), 23 bits each of the 128 that one block gives. `place`: below 2^29, a node or the
    /// ordinal of a hit; `index`: which electron.
    Uniforms uniform(std::int64_t step, Draw draw, std::uint32_t place, std::uint32_t index) const {
        const r123::Philox4x32::ctr_type counter{{static_cast<std::uint32_t>(step),
                                                  static_cast<std::uint32_t>(step >> 32),
                                                  (place << 3) | static_cast<std::uint32_t>(draw), index}};
        const auto bits = r123::Philox4x32()(counter, key_);
        Uniforms result{};
        for (std::size_t k = 0; k < 4; ++k) {
            result[k] = middle(bits[k] >> 9);
        }
        // The fifth from what the first three leave: 9 + 9 + 5 bits.
        result[4] = middle((bits[0] & 511) << 14 | (bits[1] & 511) << 5 | (bits[2] & 511) >> 4);
        return result;
    }

private:
    /// 23 bits and half a unit: never 0, never 1, exact in float.
    static float middle(std::uint32_t bits) { return (static_cast<float>(bits) + 0.5f) * 0x1p-23f; }

    r123::Philox4x32::key_type key_;
};

}  // namespace spokewright
