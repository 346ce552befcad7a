// SPDX-License-Identifier: MIT
// One number an electron, for the sums of electron_sums.
#pragma once

#include "pic/lane_shares.hpp"

namespace spokewright {

template <class Lanes>
struct SumLoops : LaneShares<Lanes> {
    using Base = LaneShares<Lanes>;
    using Base::area_share;
    using Base::find_cells;
    using Base::gamma_squared;
    using Base::half_kick;
    using Base::kWidth;
    using Base::place;
    using Base::row_bend;
    using typename Base::Int;
    using typename Base::Place;
    using typename Base::Real;
    using typename Base::Tail;
    using typename Base::Vector;

    /// Calls work(electrons, p, count, k) for pieces of a range: `count` electrons, whole vectors, from index p on, the
    /// k-th of the range. The last vector comes from a copy with spare lanes.
    template <class Work>
    static void for_each_piece(const ElectronView& electrons, std::size_t begin, std::size_t end, const Work& work) {
        std::size_t p = begin;
        while (p + kWidth <= end) {
            const std::size_t whole = (end - p) / kWidth * kWidth;
            const std::size_t count = whole < kPiece ? whole : kPiece;
            work(electrons, p, count, p - begin);
            p += count;
        }
        if (p < end) {
            Tail tail(electrons, p, end - p);
            work(tail.arrays(), 0, kWidth, p - begin);
        }
    }

    static void kinetic(const ParticlePlan& plan, const CellForce* force, const ElectronView& electrons,
                        std::size_t begin, std::size_t end, float* energy) {
        const auto work = [&](const ElectronView& e, std::size_t from, std::size_t count, std::size_t to) {
            alignas(64) std::int32_t cells[kPiece];
            for (std::size_t k = 0; k < count; k += kWidth) {
                find_cells(plan, e, from + k, cells + k);
            }
            for (std::size_t k = 0; k < count; k += kWidth) {
                const std::size_t p = from + k;
                const Place at = place(plan, Lanes::load(e.r + p), Lanes::load(e.theta + p));
                const typename Lanes::Cells cell = Lanes::gather(force, cells + k);
                const Vector kick = half_kick(cell, at, area_share(at.depth, cell.bend));
                const Vector u{Lanes::add(Lanes::load(e.u_r + p), kick.r),
                               Lanes::add(Lanes::load(e.u_theta + p), kick.theta)};
                const Real square = Lanes::fma(u.theta, u.theta, Lanes::multiply(u.r, u.r));
                const Real gamma = Lanes::root(gamma_squared(plan, u));
                Lanes::store(energy + to + k, Lanes::divide(square, Lanes::add(gamma, Lanes::all(1.0f))));
            }
        };
        for_each_piece(electrons, begin, end, work);
    }

    static void turning(const ParticlePlan& plan, const ElectronView& electrons, std::size_t begin, std::size_t end,
                        float* inner, float* outer) {
        const auto work = [&](const ElectronView& e, std::size_t from, std::size_t count, std::size_t to) {
            for (std::size_t k = 0; k < count; k += kWidth) {
                const std::size_t p = from + k;
                const Int r = Lanes::load(e.r + p);
                const Vector u{Lanes::load(e.u_r + p), Lanes::load(e.u_theta + p)};
                const Place at = place(plan, r, Lanes::load(e.theta + p));
                const Real area = area_share(at.depth, row_bend(plan, r));
                const Real rho =
                    Lanes::fma(Lanes::real(r), Lanes::all(1.0f / kRadialOne), Lanes::all(plan.cathode_cells));
                const Real gamma = Lanes::root(gamma_squared(plan, u));
                const Real speed = Lanes::divide(u.theta, Lanes::multiply(gamma, rho));
                const Real share = Lanes::multiply(speed, area);
                Lanes::store(outer + to + k, share);
                Lanes::store(inner + to + k, Lanes::subtract(speed, share));
            }
        };
        for_each_piece(electrons, begin, end, work);
    }

private:
    static constexpr std::size_t kPiece = 256;
};

}  // namespace spokewright
