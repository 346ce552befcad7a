// SPDX-License-Identifier: MIT
// One electron at a time, in portable C++: the fallback for every processor, and the twin that the vector lanes are
// tested against. Where the processor has no fused multiply-add, std::fma is a (slow, exact) call into libm.
#pragma once

#include <cmath>
#include <cstddef>
#include <cstdint>

#include "pic/cell_force.hpp"

namespace spokewright {

struct PlainLanes {
    static constexpr std::size_t kWidth = 1;
    using Real = float;
    using Int = std::int32_t;
    using Cells = CellForce;

    static Real load(const float* from) { return *from; }
    static Int load(const std::int32_t* from) { return *from; }
    static void store(float* to, Real value) { *to = value; }
    static void store(std::int32_t* to, Int value) { *to = value; }
    static Real all(float value) { return value; }
    static Int all(std::int32_t value) { return value; }

    static Real add(Real a, Real b) { return a + b; }
    static Real subtract(Real a, Real b) { return a - b; }
    static Real multiply(Real a, Real b) { return a * b; }
    static Real divide(Real a, Real b) { return a / b; }
    static Real root(Real a) { return std::sqrt(a); }
    static Real fma(Real a, Real b, Real c) { return std::fma(a, b, c); }            // a b + c
    static Real negative_fma(Real a, Real b, Real c) { return std::fma(-a, b, c); }  // c - a b
    /// Between -limit and limit; -limit for a NaN.
    static Real clamp(Real a, float limit) {
        const Real low = a > -limit ? a : -limit;
        return low < limit ? low : limit;
    }

    static Int add(Int a, Int b) { return a + b; }
    static Int subtract(Int a, Int b) { return a - b; }
    static Int multiply(Int a, Int b) { return a * b; }
    static Int both(Int a, Int b) { return a & b; }
    template <int bits>
    static Int shift_right(Int a) {
        return a >> bits;
    }
    static Int where_negative(Int test, Int value) { return test < 0 ? value : 0; }
    static Int where_not_negative(Int test, Int value) { return test < 0 ? 0 : value; }

    static Real real(Int a) { return static_cast<Real>(a); }
    static Int rounded(Real a) { return static_cast<Int>(std::lrint(a)); }  // to nearest, ties to even

    /// A bit for each electron with r <= 0 or r >= end.
    static std::uint32_t outside(Int r, std::int32_t end) { return r <= 0 || r >= end ? 1 : 0; }

    /// a - b in double precision, rounded once.
    static Real difference(const double* a, const double* b) { return static_cast<Real>(*a - *b); }
    static void store_cells(CellForce* to, const Cells& cells) { *to = cells; }

    static Cells gather(const CellForce* cells, const std::int32_t* at) { return cells[*at]; }

    static void store_corners(CellCharge* to, Int inner, Int inner_next, Int outer, Int outer_next) {
        *to = {inner, inner_next, outer, outer_next};
    }
    static std::size_t corner_place(std::size_t) { return 0; }

    static void add(CellCharge& cell, const CellCharge& corners) {
        // Unsigned: an overflow wraps, as in the vector lanes, and the scatter's total shows it.
        const auto sum = [](Int a, Int b) {
            return static_cast<Int>(static_cast<std::uint32_t>(a) + static_cast<std::uint32_t>(b));
        };
        cell = {sum(cell.inner, corners.inner), sum(cell.inner_next, corners.inner_next),
                sum(cell.outer, corners.outer), sum(cell.outer_next, corners.outer_next)};
    }
};

}  // namespace spokewright
