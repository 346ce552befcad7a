// SPDX-License-Identifier: MIT
// Electrons leave the cathode: by heat and pulling field up to the space-charge limit, and by impact. Each starts at a
// random instant of the step from a flux-weighted half-Maxwellian, with the matching fraction of the step's kick, turn
// and move (second order).
#pragma once

#include <span>
#include <vector>

#include "fields/surface_field.hpp"
#include "inputs/deck.hpp"
#include "pic/counter_random.hpp"
#include "pic/electron_store.hpp"
#include "pic/step_units.hpp"
#include "pic/walls.hpp"

namespace spokewright {

class Cathode {
public:
    Cathode(const Deck& deck, const StepUnits& units, double macro_charge);

    /// Secondaries of the impacts, then primaries: per node the charge that brings the normal field on the surface to
    /// zero (Gauss's law on the half cell), less what the impacts gave, at most what heat or the deck's limit allows.
    /// Appends to the store. `step`: number of the step, for the random numbers.
    /// `surface` at the start of the step; `magnetic`: field at the cathode, T.
    void emit(std::int64_t step, const SurfaceField& surface, double magnetic, std::span<const CathodeImpact> impacts,
              ElectronStore& store);

    // What the last call of emit() released.
    std::int64_t primaries() const { return primaries_; }
    std::int64_t secondaries() const { return secondaries_; }
    double energy_eV() const { return energy_eV_; }  // kinetic, at the surface, sum over macro-electrons

private:
    void emit_secondaries(std::int64_t step, const SurfaceField& surface, std::span<const CathodeImpact> impacts,
                          ElectronStore& store);
    /// Macro-electrons that heat and the deck's limit allow at one node in one step.
    double allowance(double pulling_field) const;
    /// `theta`: fixed point, may lie outside one turn. `thermal`: sqrt(kT / m), velocity units. `random`: normal speed,
    /// tangential speed (two), instant within the step.
    void launch(std::int32_t theta, std::size_t node, double thermal, const Uniforms& random,
                const SurfaceField& surface, ElectronStore& store);

    CathodeSettings settings_;
    StepUnits units_;
    CounterRandom random_;
    double macro_charge_;  // C, negative
    EnergyScale energy_of_;
    double primary_speed_, secondary_speed_;   // sqrt(kT / m), velocity units
    double field_to_kick_;                     // half kick in velocity units for 1 V/m
    double field_to_count_;                    // macro-electrons that bring 1 V/m at one node to zero, negative
    double density_to_count_;                  // macro-electrons of 1 A/m^2 from one node in a step
    double inverse_arc_;                       // azimuthal cells in one radial cell's length on the cathode
    double turn_ = 0;                          // gyration angle of the step at the cathode, rad
    std::vector<double> secondaries_at_node_;  // [n_theta], of the last call
    std::int64_t primaries_ = 0;
    std::int64_t secondaries_ = 0;
    double energy_eV_ = 0;
};

}  // namespace spokewright
