// SPDX-License-Identifier: MIT
// The deposit of charge by area weighting (C. K. Birdsall & A. B. Langdon, Plasma Physics via Computer Simulation
// (1985), sections 2-6 and 14-11), in integers.
#pragma once

#include "pic/lane_shares.hpp"

namespace spokewright {

template <class Lanes>
struct ScatterLoops : LaneShares<Lanes> {
    using Base = LaneShares<Lanes>;
    using Base::area_share;
    using Base::kWidth;
    using Base::place;
    using Base::row_bend;
    using typename Base::Int;
    using typename Base::Place;
    using typename Base::Real;
    using typename Base::Tail;

    /// What a block of electrons leaves, and where.
    struct Deposit {
        static constexpr std::size_t kSize = 128;
        alignas(64) CellCharge corners[kSize];
        alignas(64) std::int32_t cell[kSize];
    };

    /// Corners of kWidth electrons to place k of the block.
    static void share_charge(const ParticlePlan& plan, const ElectronView& electrons, std::size_t p, Deposit& block,
                             std::size_t k) {
        const Int r = Lanes::load(electrons.r + p);
        const Place at = place(plan, r, Lanes::load(electrons.theta + p));
        const Real area = area_share(at.depth, row_bend(plan, r));
        const Real one = Lanes::all(1.0f * kChargeOne);
        // Three corners rounded, the fourth as the remainder: the electron's charge is exact.
        const Int outer = Lanes::rounded(Lanes::multiply(area, one));
        const Int next = Lanes::rounded(Lanes::multiply(at.azimuthal, one));
        const Int outer_next = Lanes::rounded(Lanes::multiply(Lanes::multiply(area, at.azimuthal), one));
        const Int inner_next = Lanes::subtract(next, outer_next);
        Lanes::store(block.cell + k, at.cell);
        Lanes::store_corners(block.corners + k,
                             Lanes::subtract(Lanes::subtract(Lanes::all(kChargeOne), outer), inner_next), inner_next,
                             Lanes::subtract(outer, outer_next), outer_next);
    }

    static void scatter(const ParticlePlan& plan, const ElectronView& electrons, std::size_t begin, std::size_t end,
                        CellCharge* cells) {
        Deposit block;
        const auto add = [&](std::size_t from, std::size_t k) {
            Lanes::add(cells[block.cell[from + k]], block.corners[from + Lanes::corner_place(k)]);
        };
        std::size_t p = begin;
        while (p + kWidth <= end) {
            const std::size_t whole = (end - p) / kWidth * kWidth;
            const std::size_t count = whole < Deposit::kSize ? whole : Deposit::kSize;
            for (std::size_t from = 0; from < count; from += kWidth) {
                share_charge(plan, electrons, p + from, block, from);
            }
            for (std::size_t from = 0; from < count; from += kWidth) {
#pragma GCC unroll 16
                for (std::size_t k = 0; k < kWidth; ++k) {
                    add(from, k);
                }
            }
            p += count;
        }
        if (p < end) {
            Tail tail(electrons, p, end - p);
            share_charge(plan, tail.arrays(), 0, block, 0);
            for (std::size_t k = 0; k < end - p; ++k) {
                add(0, k);
            }
        }
    }
};

}  // namespace spokewright
