// SPDX-License-Identifier: MIT
// The vane block's resonators: one parallel LC circuit with loss and load a standing pattern,
//   C dv/dt + G v + i = dq/dt,  L di/dt = v,
// driven by the charge q that the electrons induce on the pattern (W. Shockley, J. Appl. Phys. 9, 635 (1938);
// S. Ramo, Proc. IRE 27, 584 (1939)). Implicit midpoint: energy is exact, and L is chosen so that the discrete circuit
// rings at the given frequency exactly (prewarping, A. Tustin, J. IEE 94, 130 (1947), from memory). SI units.
#pragma once

#include <complex>
#include <span>
#include <vector>

#include "fields/vane_wall.hpp"
#include "inputs/deck.hpp"

namespace spokewright {

/// Admittance of the load over that of a matched one, y = (1 - Gamma) / (1 + Gamma).
/// Gamma has magnitude (vswr - 1) / (vswr + 1) and the deck's phase.
std::complex<double> load_admittance(const LoadSettings& load);

struct Resonator {
    VanePattern pattern;
    std::size_t entry;          // index of its mode in CircuitSettings::modes
    double capacitance;         // F, C_k
    double wall_conductance;    // S, omega C / Q_0
    double load_conductance;    // S, omega C Re(y) / Q_ext
    double inverse_inductance;  // 1/H, prewarped, the load's susceptance included
    double voltage = 0;         // V, v_k
    double current = 0;         // A, i_k

    /// v + j i / (omega C): turns as exp(j omega t) when the circuit rings.
    std::complex<double> amplitude() const;
    double energy() const;  // J
};

/// Energy that passed in one step, J. Out of the coupling goes `load`, into it comes `drive`: the wave that the load
/// sends back is the generator's, so that without a generator `load` is all that the load conductance takes.
struct ResonatorEnergy {
    double from_electrons = 0;
    double wall_loss = 0;
    double load = 0;
    double drive = 0;
};

class Resonators {
public:
    /// An empty bank when the circuit has no source. `drive`: a generator behind the output coupling of one mode, whose
    /// incident wave carries the available power P: a current I cos(omega t + phase) across the load conductance G with
    /// P = I^2 / (8 G); the two patterns of a mode n < N/2 share it a quarter period apart, as a wave with +theta.
    Resonators(const CircuitSettings& circuit, const LoadSettings& load, int vane_count, double dt,
               const DriveSettings& drive = {});

    /// One step from `time` (s) on; `induced`: rise of q_k within it, C, one a resonator.
    ResonatorEnergy advance(std::span<const double> induced, double time = 0);

    /// Adds a wave of `voltage` (V) to mode number n, turning with +theta (standing for the pi mode). Returns J put in.
    double prime(int mode, double voltage);

    double energy() const;  // J
    std::span<const Resonator> all() const { return resonators_; }
    std::span<Resonator> all() { return resonators_; }

private:
    /// Generator current into one resonator at a time, A.
    double drive_current(const Resonator& resonator, double time) const;

    std::vector<Resonator> resonators_;
    double dt_;
    DriveSettings drive_;
};

}  // namespace spokewright
