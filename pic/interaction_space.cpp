// SPDX-License-Identifier: MIT
#include "pic/interaction_space.hpp"

#include <cmath>

#include "pic/macro_charge.hpp"

namespace spokewright {
namespace {

PolarGrid grid_of(const Deck& deck) {
    return {deck.tube.cathode_radius, deck.tube.anode_radius, deck.tube.axial_height, deck.grid.radial_cells,
            deck.grid.azimuthal_cells};
}

double vacuum_capacitance(const TubeSettings& tube) {
    return 2 * kPi * kVacuumPermittivity * tube.axial_height / std::log(tube.anode_radius / tube.cathode_radius);
}

}  // namespace

InteractionSpace::InteractionSpace(const Deck& deck, int threads, InstructionSet set)
    : deck_(deck),
      units_{grid_of(deck), deck.clock.step},
      macro_charge_(macro_charge_of(deck)),
      magnet_(deck.magnet, units_.grid),
      resonators_(deck.circuit, deck.load, deck.tube.vane_count, deck.clock.step, deck.drive),
      supply_(deck.supply, vacuum_capacitance(deck.tube), deck.clock.step),
      poisson_(units_.grid),
      surface_(units_.grid),
      force_(units_, threads, set),
      push_(units_, threads, set),
      scatter_(units_, macro_charge_, threads, set),
      sums_(units_, threads, set),
      walls_(units_, deck),
      cathode_(deck, units_, macro_charge_),
      wall_(static_cast<std::size_t>(poisson_.harmonics())),
      potential_(units_.grid.nodes()),
      modal_charge_(resonators_.all().size()),
      induced_(resonators_.all().size()),
      row_current_(static_cast<std::size_t>(units_.grid.n_r) + 1) {
    const VaneWall wall(deck.tube.vane_count, deck.tube.gap_share);
    for (const Resonator& resonator : resonators_.all()) {
        pattern_nodes_.push_back(wall.profile_at_nodes(resonator.pattern.vanes, units_.grid.n_theta));
        pattern_harmonics_.push_back(Poisson::wall_harmonics(pattern_nodes_.back()));
    }
    store_.reserve(2 * static_cast<std::size_t>(deck.electrons.target_count));
    tally_.dt = units_.dt;
    settle_fields();
}

const Tally& InteractionSpace::step() {
    const double joule = macro_weight() * kElementaryCharge;  // J in one eV a macro-electron
    const std::int64_t number = tally_.step;                  // of the step that begins; names its random numbers
    ++tally_.step;
    tally_.time = time();

    push_.advance(store_, force_);  // u to n + 1/2, r to n + 1
    walls_.strike(store_, push_.hits());
    store_.remove(push_.hits());
    // into the step n -> n + 1, by the surface field of n
    cathode_.emit(number, surface_, magnet_.field().front(), walls_.impacts(), store_);
    scatter_.deposit(store_);  // charge at n + 1
    poisson_.transform(scatter_.node_charge());
    advance_circuit();  // vane and anode voltages at n + 1
    solve_field();      // potential, field and force at n + 1
    if (deck_.magnet.self_field && tally_.step % kSelfFieldEvery == 0) {
        update_self_field();
    }

    tally_.primaries = cathode_.primaries();
    tally_.secondaries = cathode_.secondaries();
    tally_.anode_hits = walls_.anode_hits();
    tally_.cathode_hits = walls_.cathode_hits();
    tally_.electrons = static_cast<std::int64_t>(store_.size());
    tally_.emission_energy = joule * cathode_.energy_eV();
    tally_.anode_energy = joule * walls_.anode_energy_eV();
    tally_.cathode_energy = joule * walls_.cathode_energy_eV();
    return tally_;
}

void InteractionSpace::advance_circuit() {
    const auto deposit = walls_.anode_deposit();
    for (std::size_t k = 0; k < induced_.size(); ++k) {
        const double charge = poisson_.row_product(pattern_harmonics_[k], poisson_.wall_charge());
        double landed = 0;
        for (std::size_t j = 0; j < deposit.size(); ++j) {
            landed += deposit[j] * pattern_nodes_[k][j];
        }
        induced_[k] = charge - modal_charge_[k] + macro_charge_ * landed;
        modal_charge_[k] = charge;
    }
    const double whole = poisson_.wall_charge()[0].real();
    const double risen = whole - whole_anode_charge_ + macro_charge_ * static_cast<double>(walls_.anode_hits());
    whole_anode_charge_ = whole;

    const ResonatorEnergy energy = resonators_.advance(induced_, tally_.time - units_.dt);
    const PrimeSettings& prime = deck_.prime;
    const bool due = prime.time >= tally_.time - units_.dt && prime.time < tally_.time;
    tally_.prime_energy = prime.voltage > 0 && due ? resonators_.prime(prime.mode, prime.voltage) : 0;
    tally_.mode_energy = energy.from_electrons;
    tally_.wall_loss = energy.wall_loss;
    tally_.load_energy = energy.load;
    tally_.drive_energy = energy.drive;
    tally_.induced_charge = -risen;  // electrons are negative: their arrival is a current out of the supply
    tally_.supply_energy = supply_.advance(tally_.time, tally_.induced_charge);
    tally_.anode_voltage = supply_.voltage();
}

void InteractionSpace::solve_field() {
    std::fill(wall_.begin(), wall_.end(), std::complex<double>{});
    wall_[0] = supply_.voltage() * units_.grid.n_theta;
    for (std::size_t k = 0; k < pattern_harmonics_.size(); ++k) {
        const double voltage = resonators_.all()[k].voltage;
        for (std::size_t m = 0; m < wall_.size(); ++m) {
            wall_[m] += voltage * pattern_harmonics_[k][m];
        }
    }
    poisson_.solve(wall_, potential_);
    surface_.update(poisson_, potential_, scatter_.node_charge());
    force_.update(potential_, surface_, magnet_.field());
}

void InteractionSpace::update_self_field() {
    // Azimuthal current of each row, A/m: charge times angular speed / 2 pi, shared between rows like the charge.
    std::fill(row_current_.begin(), row_current_.end(), 0.0);
    sums_.add_angular_speed(store_, row_current_);
    for (double& current : row_current_) {
        current *= macro_charge_ / (2 * kPi * units_.grid.axial_height);
    }
    magnet_.set_self_field(row_current_);
}

void InteractionSpace::place_electron(double radius, double theta, double u_r, double u_theta) {
    const double cells = (radius - units_.grid.cathode_radius) / units_.grid.dr();
    const double turns = theta / (2 * kPi) - std::floor(theta / (2 * kPi));
    const auto place = static_cast<std::int32_t>(turns * units_.azimuthal_end());
    store_.append({static_cast<std::int32_t>(std::lrint(cells * kRadialOne)), place % units_.azimuthal_end(),
                   static_cast<float>(u_r / units_.speed()), static_cast<float>(u_theta / units_.speed())});
}

void InteractionSpace::settle_fields() {
    scatter_.deposit(store_);
    poisson_.transform(scatter_.node_charge());
    for (std::size_t k = 0; k < modal_charge_.size(); ++k) {
        modal_charge_[k] = poisson_.row_product(pattern_harmonics_[k], poisson_.wall_charge());
    }
    whole_anode_charge_ = poisson_.wall_charge()[0].real();
    tally_.electrons = static_cast<std::int64_t>(store_.size());
    tally_.anode_voltage = supply_.voltage();
    solve_field();
}

}  // namespace spokewright
