// SPDX-License-Identifier: MIT
// What one step hands to the observers: plain numbers each step, read-only views at a sample. SI units.
#pragma once

#include <complex>
#include <cstdint>
#include <span>
#include <vector>

#include "diagnostics/wall_books.hpp"
#include "fields/polar_grid.hpp"

namespace spokewright {

/// One step from t - dt to t. Counts are macro-electrons, energies are J within the step.
struct Tally {
    std::int64_t step = 0;      // 1 after the first step
    double time = 0;            // s, at the end of the step
    double dt = 0;              // s
    double anode_voltage = 0;   // V, at the end
    double induced_charge = 0;  // C, positive when electrons move to the anode; / dt = anode current (Shockley-Ramo)

    std::int64_t primaries = 0;    // emitted by heat or field
    std::int64_t secondaries = 0;  // emitted by impact
    std::int64_t anode_hits = 0;
    std::int64_t cathode_hits = 0;
    std::int64_t electrons = 0;  // in flight at the end

    double supply_energy = 0;    // delivered by the supply to the electrons
    double prime_energy = 0;     // put into the resonators from outside
    double drive_energy = 0;     // brought by the generator's incident wave
    double mode_energy = 0;      // given by the electrons to the resonators
    double wall_loss = 0;        // in the resonators' Q_0
    double load_energy = 0;      // into the load through Q_ext
    double emission_energy = 0;  // kinetic, of emitted electrons
    double anode_energy = 0;     // kinetic, left on the anode
    double cathode_energy = 0;   // kinetic, left on the cathode
};

/// One mode at an instant. A wave with positive `forward` phase advance turns with the electrons (+theta).
struct ModeState {
    int number;                     // n
    double frequency;               // Hz, cold
    double capacitance;             // F, C_k of one resonator of the mode
    bool standing;                  // the pi mode: one resonator, `backward` stays 0
    std::complex<double> forward;   // V, amplitude of exp(j omega t - j n theta)
    std::complex<double> backward;  // V, amplitude of exp(j omega t + j n theta)
    double energy;                  // J, stored in the mode's resonators
};

/// The interaction space at a sample: views, valid until the next step.
struct SpaceView {
    double time;  // s
    PolarGrid grid;
    double macro_charge;                  // C, negative
    double macro_weight;                  // real electrons in one macro-electron
    std::span<const double> node_charge;  // C, [n_r + 1][n_theta]
    std::span<const double> potential;    // V, [n_r + 1][n_theta]
    std::span<const ModeState> modes;     // rising mode number
    double kinetic_energy;                // J, of all electrons at this instant
    double space_charge_energy;           // J, sum of node charge times space-charge potential / 2
    double resonator_energy;              // J
    double self_field_share;              // largest |B_self| / |B|, 0 when switched off
    std::int64_t scattered_electrons;     // sum of the grid's integer charge in macro-electrons: must equal `electrons`
    std::int64_t electrons;               // in the store
    const WallBooks& books;               // totals since the start
};

/// Electrons for a snapshot, SI, one entry each: r (m), theta (rad), u = gamma v (m/s).
struct ElectronSnapshot {
    std::vector<float> radius, theta, u_r, u_theta;
};

}  // namespace spokewright
