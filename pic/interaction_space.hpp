// SPDX-License-Identifier: MIT
// The interaction space: electrons, field, circuit, supply and cathode of one tube, and the step that carries them all
// from time n to n + 1. Positions, fields, voltages stand at whole steps, momenta half a step earlier.
#pragma once

#include <span>
#include <vector>

#include "diagnostics/tally.hpp"
#include "fields/magnet.hpp"
#include "fields/poisson.hpp"
#include "fields/resonators.hpp"
#include "fields/supply.hpp"
#include "fields/surface_field.hpp"
#include "pic/cathode.hpp"
#include "pic/electron_sums.hpp"
#include "pic/force_table.hpp"
#include "pic/push.hpp"
#include "pic/scatter.hpp"
#include "pic/walls.hpp"

namespace spokewright {

/// Steps between two updates of the self field, under a gyration: the axisymmetric current changes over many.
inline constexpr int kSelfFieldEvery = 32;

/// All that a step reads and changes beyond what follows from it; save and restore go through it.
struct SpaceState {
    std::int64_t step = 0;
    ElectronStore electrons;
    std::vector<double> resonator_voltage, resonator_current;  // [resonators]
    double anode_voltage = 0;                                  // V
    std::vector<double> self_field;                            // T, [n_r + 1]
    WallBooks books;
};

class InteractionSpace {
public:
    /// Threads and instruction set change the time a step takes, never its result.
    explicit InteractionSpace(const Deck& deck, int threads = 1, InstructionSet set = fastest_instruction_set());

    /// One step. Throws NumericsError (see Scatter).
    const Tally& step();

    /// Adds an electron at rest in the frame of its momentum: for loaded initial states. SI: m, rad, gamma v in m/s
    /// half a step before now. Call settle_fields() after the last one.
    void place_electron(double radius, double theta, double u_r, double u_theta);
    /// Fields of the electrons as they stand, without a step.
    void settle_fields();

    SpaceView view();
    ElectronSnapshot electrons() const;
    SpaceState save() const;
    void restore(const SpaceState& state);

    const StepUnits& units() const { return units_; }
    double macro_charge() const { return macro_charge_; }  // C, negative
    double macro_weight() const { return macro_charge_ / -kElementaryCharge; }
    double time() const { return static_cast<double>(tally_.step) * units_.dt; }
    const Tally& tally() const { return tally_; }
    /// No field, voltage or momentum has gone non-finite.
    bool finite() const;
    Resonators& resonators() { return resonators_; }

private:
    void advance_circuit();
    void solve_field();
    void update_self_field();
    void update_mode_states();

    Deck deck_;
    StepUnits units_;
    double macro_charge_;
    Magnet magnet_;
    Resonators resonators_;
    Supply supply_;
    Poisson poisson_;
    SurfaceField surface_;
    ForceTable force_;
    ElectronStore store_;
    Push push_;
    Scatter scatter_;
    ElectronSums sums_;
    Walls walls_;
    Cathode cathode_;

    std::vector<Poisson::Harmonics> pattern_harmonics_;  // [resonators][harmonics] of the wall at 1 V
    std::vector<std::vector<double>> pattern_nodes_;     // [resonators][n_theta]
    Poisson::Harmonics wall_;                            // harmonics of phi(r_a), V
    AlignedVector<double> potential_;                    // V, [n_r + 1][n_theta]
    std::vector<double> modal_charge_;                   // C, space charge times weighting potential, [resonators]
    std::vector<double> induced_;                        // C within the step, [resonators]
    std::vector<double> row_current_;                    // A/m, of the azimuthal motion, [n_r + 1]
    double whole_anode_charge_ = 0;                      // the same for the whole anode
    std::vector<ModeState> mode_states_;
    Tally tally_;
};

}  // namespace spokewright
