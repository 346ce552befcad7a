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

/// Energy that passed in one step, J.
struct ResonatorEnergy {
    double from_electrons = 0;
    double wall_loss = 0;
    double load = 0;
};

class Resonators {
public:
    /// An empty bank when the circuit has no source.
    Resonators(const CircuitSettings& circuit, const LoadSettings& load, int vane_count, double dt);

    /// One step; `induced`: rise of q_k within it, C, one a resonator.
    ResonatorEnergy advance(std::span<const double> induced);

    /// Adds a wave of `voltage` (V) to mode number n, turning with +theta (standing for the pi mode). Returns J put in.
    double prime(int mode, double voltage);

    double energy() const;  // J
    std::span<const Resonator> all() const { return resonators_; }
    std::span<Resonator> all() { return resonators_; }

private:
    std::vector<Resonator> resonators_;
    double dt_;
};

}  // namespace spokewright
