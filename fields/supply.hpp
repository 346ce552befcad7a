// SPDX-License-Identifier: MIT
// The high-voltage supply: a piecewise-linear programme, ideal, or behind a series resistance and a shunt capacitance,
//   C dV/dt = (V_programme - V) / R - I_induced,
// or a current source under the programme's voltage, C dV/dt = I_set - I_induced. SI units.
#pragma once

#include "inputs/deck.hpp"

namespace spokewright {

class Supply {
public:
    /// `tube_capacitance`: cathode to anode, F; it always stands beside the deck's shunt capacitance.
    Supply(const SupplySettings& settings, double tube_capacitance, double dt);

    /// The programme's voltage at a time, V.
    double programme_voltage(double time) const;

    /// One step that ends at `time`; `induced`: charge the electrons moved to the anode within it, C (positive when
    /// electrons arrive). Returns the energy that the tube took, J: mean voltage times charge.
    double advance(double time, double induced);

    double voltage() const { return voltage_; }
    void restore(double voltage) { voltage_ = voltage; }

private:
    SupplySettings settings_;
    double capacitance_;
    double dt_;
    double voltage_;
};

}  // namespace spokewright
