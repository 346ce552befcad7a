// SPDX-License-Identifier: MIT
// The work done on every electron and every cell, as plain functions over ranges, once for each instruction set of the
// processor. All do the same IEEE 754 single-precision operations in the same order (add, multiply, fused multiply-add,
// divide, square root, rounding to integer: all correctly rounded), so their results are equal to the last bit.
#pragma once

#include <cstddef>
#include <cstdint>
#include <string_view>
#include <vector>

#include "pic/cell_force.hpp"

namespace spokewright {

enum class InstructionSet { plain, avx2, avx512 };

/// Those that this build holds and this processor runs, plain first, the fastest last.
std::vector<InstructionSet> instruction_sets();
InstructionSet fastest_instruction_set();
std::string_view name_of(InstructionSet set);

/// The store's arrays (electron_store.hpp).
struct ElectronArrays {
    std::int32_t* r;
    std::int32_t* theta;
    float* u_r;
    float* u_theta;
};

struct ElectronView {
    ElectronView(const std::int32_t* r_, const std::int32_t* theta_, const float* u_r_, const float* u_theta_)
        : r(r_), theta(theta_), u_r(u_r_), u_theta(u_theta_) {}
    ElectronView(const ElectronArrays& from) : ElectronView(from.r, from.theta, from.u_r, from.u_theta) {}
    const std::int32_t* r;
    const std::int32_t* theta;
    const float* u_r;
    const float* u_theta;
};

/// Numbers that hold for a whole run, in the units of step_units.hpp.
struct ParticlePlan {
    std::int32_t stride;         // cells from one row of a cell table to the next
    std::int32_t radial_end;     // the anode, fixed point
    std::int32_t azimuthal_end;  // one turn, fixed point
    float inverse_c2;            // 1 / c^2
    float cathode_cells;         // r_c in radial cells
    float angle_to_fixed;        // fixed-point theta in one radian, twice: the push has half the angle
};

/// Factors of one row of cells.
struct RowForce {
    float across;                // radial kick for 1 V from row to row
    float inner_arc, outer_arc;  // azimuthal kick for 1 V from node to node on the inner and the outer row
    float slope, bend;           // as in CellForce, the same all round
    float turn, turn_rise;
};

/// Electrons in the widest vector.
inline constexpr std::size_t kWidest = 16;

struct ParticleKernel {
    /// One leapfrog step of the electrons [begin, end): u from n - 1/2 to n + 1/2, then r and theta from n to n + 1.
    /// Writes the indices, rising, of those that end at or beyond an electrode and keep the state they arrive with.
    /// Returns how many; `hits` has room for end - begin.
    std::size_t (*push)(const ParticlePlan& plan, const CellForce* force, const ElectronArrays& electrons,
                        std::size_t begin, std::size_t end, std::uint32_t* hits);

    /// Adds the charge of the electrons [begin, end) to the cells.
    void (*scatter)(const ParticlePlan& plan, const ElectronView& electrons, std::size_t begin, std::size_t end,
                    CellCharge* cells);

    /// u^2 / (1 + gamma) of each electron at time n, u carried half an electric kick forward, which is where Boris's
    /// scheme passes time n. Times m (velocity unit)^2 it is the kinetic energy. [end - begin], with room for
    /// whole vectors of kWidest.
    void (*kinetic)(const ParticlePlan& plan, const CellForce* force, const ElectronView& electrons, std::size_t begin,
                    std::size_t end, float* energy);

    /// Angular speed of each electron, rad a step, shared between the rows within and without it. As `energy`.
    void (*turning)(const ParticlePlan& plan, const ElectronView& electrons, std::size_t begin, std::size_t end,
                    float* inner, float* outer);

    /// The force in one row of `width` cells from the potential of its inner and outer nodes, V, [width] each.
    /// Potentials are subtracted in double precision: they are thousands of volts, their differences single ones.
    void (*tabulate)(const RowForce& row, const double* inner, const double* outer, std::size_t width,
                     CellForce* cells);
};

/// Throws std::invalid_argument for a set that is not among instruction_sets().
const ParticleKernel& particle_kernel(InstructionSet set);

}  // namespace spokewright
