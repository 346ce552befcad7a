// SPDX-License-Identifier: MIT
// Eight electrons in the 256-bit vectors of AVX2 with FMA. The same operations as PlainLanes.
#pragma once

#include <immintrin.h>

#include <cstddef>
#include <cstdint>

#include "pic/cell_force.hpp"

namespace spokewright {

struct Avx2Lanes {
    static constexpr std::size_t kWidth = 8;
    using Real = __m256;
    using Int = __m256i;
    struct Cells {
        Real radial, radial_rise, along, along_rise, slope, bend, turn, turn_rise;
    };

    static Real load(const float* from) { return _mm256_loadu_ps(from); }
    static Int load(const std::int32_t* from) { return _mm256_loadu_si256(reinterpret_cast<const __m256i*>(from)); }
    static void store(float* to, Real value) { _mm256_storeu_ps(to, value); }
    static void store(std::int32_t* to, Int value) { _mm256_storeu_si256(reinterpret_cast<__m256i*>(to), value); }
    static Real all(float value) { return _mm256_set1_ps(value); }
    static Int all(std::int32_t value) { return _mm256_set1_epi32(value); }

    static Real add(Real a, Real b) { return _mm256_add_ps(a, b); }
    static Real subtract(Real a, Real b) { return _mm256_sub_ps(a, b); }
    static Real multiply(Real a, Real b) { return _mm256_mul_ps(a, b); }
    static Real divide(Real a, Real b) { return _mm256_div_ps(a, b); }
    static Real root(Real a) { return _mm256_sqrt_ps(a); }
    static Real fma(Real a, Real b, Real c) { return _mm256_fmadd_ps(a, b, c); }
    static Real negative_fma(Real a, Real b, Real c) { return _mm256_fnmadd_ps(a, b, c); }
    static Real clamp(Real a, float limit) {
        return _mm256_min_ps(_mm256_max_ps(a, all(-limit)), all(limit));  // max gives its second operand for a NaN
    }

    static Int add(Int a, Int b) { return _mm256_add_epi32(a, b); }
    static Int subtract(Int a, Int b) { return _mm256_sub_epi32(a, b); }
    static Int multiply(Int a, Int b) { return _mm256_mullo_epi32(a, b); }
    static Int both(Int a, Int b) { return _mm256_and_si256(a, b); }
    template <int bits>
    static Int shift_right(Int a) {
        return _mm256_srai_epi32(a, bits);
    }
    static Int where_negative(Int test, Int value) { return _mm256_and_si256(_mm256_srai_epi32(test, 31), value); }
    static Int where_not_negative(Int test, Int value) {
        return _mm256_andnot_si256(_mm256_srai_epi32(test, 31), value);
    }

    static Real real(Int a) { return _mm256_cvtepi32_ps(a); }
    static Int rounded(Real a) { return _mm256_cvtps_epi32(a); }

    static std::uint32_t outside(Int r, std::int32_t end) {
        const Int inside =
            _mm256_and_si256(_mm256_cmpgt_epi32(r, _mm256_setzero_si256()), _mm256_cmpgt_epi32(all(end), r));
        return static_cast<std::uint32_t>(_mm256_movemask_ps(_mm256_castsi256_ps(inside))) ^ 0xFFU;
    }

    static Real difference(const double* a, const double* b) {
        const __m128 low = _mm256_cvtpd_ps(_mm256_sub_pd(_mm256_loadu_pd(a), _mm256_loadu_pd(b)));
        const __m128 high = _mm256_cvtpd_ps(_mm256_sub_pd(_mm256_loadu_pd(a + 4), _mm256_loadu_pd(b + 4)));
        return _mm256_insertf128_ps(_mm256_castps128_ps256(low), high, 1);
    }

    static void store_cells(CellForce* to, const Cells& c) {
        Real front[4], back[4];
        transpose(c.radial, c.radial_rise, c.along, c.along_rise, front);
        transpose(c.slope, c.bend, c.turn, c.turn_rise, back);
        // front[k] and back[k] hold the halves of cells k and k + 4.
        for (std::size_t k = 0; k < 4; ++k) {
            _mm256_store_ps(&to[k].radial, _mm256_permute2f128_ps(front[k], back[k], 0x20));
            _mm256_store_ps(&to[k + 4].radial, _mm256_permute2f128_ps(front[k], back[k], 0x31));
        }
    }

    /// One cell a load, then an 8 x 8 transpose.
    static Cells gather(const CellForce* cells, const std::int32_t* at) {
        // Halves of electrons k and k + 4 side by side: the 4 x 4 transposes then leave electron k in lane k.
        const auto halves = [&](std::size_t k, const float CellForce::*half) {
            const __m128 low = _mm_load_ps(&(cells[at[k]].*half));
            const __m128 high = _mm_load_ps(&(cells[at[k + 4]].*half));
            return _mm256_insertf128_ps(_mm256_castps128_ps256(low), high, 1);
        };
        constexpr auto first = &CellForce::radial, second = &CellForce::slope;
        Real front[4], back[4];
        transpose(halves(0, first), halves(1, first), halves(2, first), halves(3, first), front);
        transpose(halves(0, second), halves(1, second), halves(2, second), halves(3, second), back);
        return {front[0], front[1], front[2], front[3], back[0], back[1], back[2], back[3]};
    }

    /// Writes the corners of each electron, 16 bytes, in the order of corner_place().
    static void store_corners(CellCharge* to, Int inner, Int inner_next, Int outer, Int outer_next) {
        Real row[4];
        transpose(_mm256_castsi256_ps(inner), _mm256_castsi256_ps(inner_next), _mm256_castsi256_ps(outer),
                  _mm256_castsi256_ps(outer_next), row);
        // row[k] holds the corners of electrons k and k + 4.
        for (std::size_t k = 0; k < 4; ++k) {
            _mm256_store_si256(reinterpret_cast<__m256i*>(to + 2 * k), _mm256_castps_si256(row[k]));
        }
    }
    static std::size_t corner_place(std::size_t k) { return 2 * (k % 4) + k / 4; }

    static void add(CellCharge& cell, const CellCharge& corners) {
        auto* sum = reinterpret_cast<__m128i*>(&cell);
        const auto* more = reinterpret_cast<const __m128i*>(&corners);
        _mm_store_si128(sum, _mm_add_epi32(_mm_load_si128(sum), _mm_load_si128(more)));
    }

private:
    /// 4 x 4 in each 128-bit lane.
    static void transpose(Real a, Real b, Real c, Real d, Real* out) {
        const __m256d ab_low = _mm256_castps_pd(_mm256_unpacklo_ps(a, b));
        const __m256d ab_high = _mm256_castps_pd(_mm256_unpackhi_ps(a, b));
        const __m256d cd_low = _mm256_castps_pd(_mm256_unpacklo_ps(c, d));
        const __m256d cd_high = _mm256_castps_pd(_mm256_unpackhi_ps(c, d));
        out[0] = _mm256_castpd_ps(_mm256_unpacklo_pd(ab_low, cd_low));
        out[1] = _mm256_castpd_ps(_mm256_unpackhi_pd(ab_low, cd_low));
        out[2] = _mm256_castpd_ps(_mm256_unpacklo_pd(ab_high, cd_high));
        out[3] = _mm256_castpd_ps(_mm256_unpackhi_pd(ab_high, cd_high));
    }
};

}  // namespace spokewright
