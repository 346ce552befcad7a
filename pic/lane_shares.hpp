// SPDX-License-Identifier: MIT
// What push, scatter and sums share. The loops over the electrons are written once over `Lanes`, a vector of electrons:
// PlainLanes (one), Avx2Lanes (eight) or Avx512Lanes (sixteen).
//
// Every function of the loops is a template over Lanes, so that code made for one instruction set never stands in for
// another at link time. Square roots and divisions are the exact ones: approximations differ between processors.
#pragma once

#include <cstddef>
#include <cstdint>

#include "pic/fixed_point.hpp"
#include "pic/particle_kernel.hpp"

namespace spokewright {

template <class Lanes>
struct LaneShares {
    using Real = typename Lanes::Real;
    using Int = typename Lanes::Int;
    static constexpr std::size_t kWidth = Lanes::kWidth;

    struct Place {
        Int cell;               // index in a cell table
        Real depth, azimuthal;  // shares of the cell, 0..1
    };
    struct Vector {
        Real r, theta;
    };

    static Place place(const ParticlePlan& plan, Int r, Int theta) {
        const Int row = Lanes::template shift_right<kRadialBits>(r);
        const Int column = Lanes::template shift_right<kAzimuthalBits>(theta);
        return {Lanes::add(Lanes::multiply(row, Lanes::all(plan.stride)), column),
                Lanes::multiply(Lanes::real(Lanes::both(r, Lanes::all(kRadialMask))), Lanes::all(1.0f / kRadialOne)),
                Lanes::multiply(Lanes::real(Lanes::both(theta, Lanes::all(kAzimuthalMask))),
                                Lanes::all(1.0f / kAzimuthalOne))};
    }

    /// Cells of the kWidth electrons from index p on. For a loop of its own: what a wide store has just written is slow
    /// to read back in small pieces.
    static void find_cells(const ParticlePlan& plan, const ElectronView& electrons, std::size_t p, std::int32_t* cell) {
        Lanes::store(cell, place(plan, Lanes::load(electrons.r + p), Lanes::load(electrons.theta + p)).cell);
    }

    /// 1 / (2 r_i / dr + 1), as in the force table: a division costs less than a table here.
    static Real row_bend(const ParticlePlan& plan, Int r) {
        const Real row = Lanes::real(Lanes::template shift_right<kRadialBits>(r));
        const Real width = Lanes::fma(row, Lanes::all(2.0f), Lanes::all(2 * plan.cathode_cells + 1));
        return Lanes::divide(Lanes::all(1.0f), width);
    }

    static Real area_share(Real depth, Real bend) {
        return Lanes::fma(Lanes::multiply(bend, depth), Lanes::subtract(depth, Lanes::all(1.0f)), depth);
    }

    static Vector half_kick(const typename Lanes::Cells& cell, const Place& at, Real area) {
        const Real shape = Lanes::fma(cell.slope, Lanes::subtract(at.depth, Lanes::all(0.5f)), Lanes::all(1.0f));
        return {Lanes::multiply(Lanes::fma(cell.radial_rise, at.azimuthal, cell.radial), shape),
                Lanes::fma(cell.along_rise, area, cell.along)};
    }

    static Real gamma_squared(const ParticlePlan& plan, Vector u) {
        const Real square = Lanes::fma(u.theta, u.theta, Lanes::multiply(u.r, u.r));
        return Lanes::fma(square, Lanes::all(plan.inverse_c2), Lanes::all(1.0f));
    }

    /// The last, incomplete vector of a range: copied out, worked on, copied back.
    struct Tail {
        Tail(const ElectronView& electrons, std::size_t begin, std::size_t count) {
            for (std::size_t k = 0; k < kWidth; ++k) {
                const std::size_t p = begin + (k < count ? k : 0);  // the spare lanes repeat an electron
                r[k] = electrons.r[p];
                theta[k] = electrons.theta[p];
                u_r[k] = electrons.u_r[p];
                u_theta[k] = electrons.u_theta[p];
            }
        }
        ElectronArrays arrays() { return {r, theta, u_r, u_theta}; }
        void copy_back(const ElectronArrays& electrons, std::size_t begin, std::size_t count) const {
            for (std::size_t k = 0; k < count; ++k) {
                electrons.r[begin + k] = r[k];
                electrons.theta[begin + k] = theta[k];
                electrons.u_r[begin + k] = u_r[k];
                electrons.u_theta[begin + k] = u_theta[k];
            }
        }
        alignas(64) std::int32_t r[kWidth];
        alignas(64) std::int32_t theta[kWidth];
        alignas(64) float u_r[kWidth];
        alignas(64) float u_theta[kWidth];
    };
};

}  // namespace spokewright
