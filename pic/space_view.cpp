// SPDX-License-Identifier: MIT
// What the interaction space shows and keeps: samples, snapshots, state.
#include <algorithm>
#include <cmath>

#include "pic/interaction_space.hpp"

namespace spokewright {

void InteractionSpace::update_mode_states() {
    mode_states_.clear();
    const auto bank = resonators_.all();
    for (std::size_t k = 0; k < bank.size(); ++k) {
        const Resonator& first = bank[k];
        const ModeEntry& entry = deck_.circuit.modes[first.entry];
        ModeState state{entry.number, entry.frequency, first.capacitance, true, first.amplitude(), {}, first.energy()};
        if (first.pattern.standing == Standing::cosine) {
            const Resonator& second = bank[++k];
            const std::complex<double> j_sine = std::complex<double>(0, 1) * second.amplitude();
            state.standing = false;
            state.forward = 0.5 * (first.amplitude() + j_sine);
            state.backward = 0.5 * (first.amplitude() - j_sine);
            state.energy += second.energy();
        }
        mode_states_.push_back(state);
    }
}

SpaceView InteractionSpace::view() {
    update_mode_states();
    // Energy of the space charge alone: what the electrodes hold besides it belongs to the supply and the resonators.
    const auto charge = scatter_.node_charge();
    double energy = -supply_.voltage() * whole_anode_charge_;
    for (std::size_t k = 0; k < modal_charge_.size(); ++k) {
        energy -= resonators_.all()[k].voltage * modal_charge_[k];
    }
    for (std::size_t node = 0; node < charge.size(); ++node) {
        energy += charge[node] * potential_[node];
    }
    return {time(),
            units_.grid,
            macro_charge_,
            macro_weight(),
            charge,
            potential_,
            mode_states_,
            sums_.kinetic_energy_eV(store_, force_) * macro_weight() * kElementaryCharge,
            0.5 * energy,
            resonators_.energy(),
            magnet_.self_field_share(),
            scatter_.scattered_electrons(),
            static_cast<std::int64_t>(store_.size()),
            walls_.books()};
}

ElectronSnapshot InteractionSpace::electrons() const {
    ElectronSnapshot snapshot;
    const double speed = units_.speed();
    for (std::size_t p = 0; p < store_.size(); ++p) {
        const double cells = units_.cathode_cells() + store_.r[p] * (1.0 / kRadialOne);
        snapshot.radius.push_back(static_cast<float>(cells * units_.grid.dr()));
        snapshot.theta.push_back(static_cast<float>(store_.theta[p] * (units_.grid.dtheta() / kAzimuthalOne)));
        snapshot.u_r.push_back(static_cast<float>(static_cast<double>(store_.u_r[p]) * speed));
        snapshot.u_theta.push_back(static_cast<float>(static_cast<double>(store_.u_theta[p]) * speed));
    }
    return snapshot;
}

SpaceState InteractionSpace::save() const {
    SpaceState state;
    state.step = tally_.step;
    state.electrons = store_;
    for (const Resonator& resonator : resonators_.all()) {
        state.resonator_voltage.push_back(resonator.voltage);
        state.resonator_current.push_back(resonator.current);
    }
    state.anode_voltage = supply_.voltage();
    state.self_field.assign(magnet_.self_field().begin(), magnet_.self_field().end());
    state.books = walls_.books();
    return state;
}

void InteractionSpace::restore(const SpaceState& state) {
    tally_.step = state.step;
    tally_.time = time();
    store_ = state.electrons;
    for (std::size_t k = 0; k < resonators_.all().size(); ++k) {
        resonators_.all()[k].voltage = state.resonator_voltage[k];
        resonators_.all()[k].current = state.resonator_current[k];
    }
    supply_.restore(state.anode_voltage);
    magnet_.restore_self_field(state.self_field);
    walls_.restore(state.books);
    settle_fields();  // charge, potential, force and modal charges follow from the electrons and the voltages
}

bool InteractionSpace::finite() const {
    // A non-finite momentum poisons the force of its own electron only; potential and circuit show the field's health.
    const auto finite_double = [](double value) { return std::isfinite(value); };
    const auto finite_float = [](float value) { return std::isfinite(value); };
    return std::all_of(potential_.begin(), potential_.end(), finite_double) &&
           std::all_of(store_.u_r.begin(), store_.u_r.end(), finite_float) &&
           std::all_of(store_.u_theta.begin(), store_.u_theta.end(), finite_float);
}

}  // namespace spokewright
