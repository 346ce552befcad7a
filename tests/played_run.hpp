// SPDX-License-Identifier: MIT
// A hot run that is only played: an invented heating tube, and a record filled from prescribed currents, modes and
// charge instead of electrons, so that the observers can be tested against numbers known beforehand.
#pragma once

#include <cmath>
#include <complex>
#include <functional>
#include <string>
#include <vector>

#include "diagnostics/record.hpp"
#include "diagnostics/tally.hpp"
#include "inputs/deck.hpp"

namespace spokewright {

/// Ten vanes, 4.2 kV, 0.185 T, pi mode at 2.45 GHz and its neighbour; a coarse grid.
inline Deck played_deck() {
    Deck deck;
    deck.tube = {"played tube", 1.95e-3, 4.45e-3, 9.5e-3, 10, 0.4};
    deck.supply.anode_voltage = 4200;
    deck.supply.programme = {{0, 0}, {5e-9, 1}};
    deck.magnet.field = 0.185;
    deck.circuit.source = CircuitSource::table;
    deck.circuit.modes = {{4, 2.80e9, 1500, 150, 1e-12}, {5, 2.45e9, 1500, 150, 1e-12}};
    deck.grid = {8, 40};
    deck.clock = {2e-12, 100e-9, 16};
    deck.electrons.target_count = 20000;
    deck.sha256 = "0123";
    return deck;
}

/// The prescribed run. Voltages are amplitudes in the order of the deck's modes, as functions of time (s).
struct PlayedRun {
    Deck deck = played_deck();
    std::function<double(double)> current = [](double) { return 1.5; };  // A, induced
    std::vector<std::function<double(double)>> mode_voltage = {[](double) { return 10.0; },
                                                               [](double) { return 2000.0; }};
    std::vector<double> mode_frequency = {2.80e9, 2.449e9};  // Hz, as it runs
    int spokes = 5;
    double bunching = 0.4;   // |Q_m| / Q_0
    double lost_energy = 0;  // share of the input that vanishes from the books
    std::int64_t stray_electrons = 0;
    double macro_charge = -1e-14;  // C

    std::vector<double> node_charge, potential;
    WallBooks books;
    std::int64_t in_flight = 0;
    std::int64_t step = 0;

    /// The tally of one step: 60 % of the input to the modes, 40 % heat; the modes give all to load (9) and walls (1).
    Tally tally() {
        ++step;
        Tally t;
        t.step = step;
        t.dt = deck.clock.step;
        t.time = static_cast<double>(step) * t.dt;
        t.anode_voltage = deck.supply.anode_voltage;
        t.induced_charge = current(t.time) * t.dt;
        t.supply_energy = t.induced_charge * t.anode_voltage;
        t.mode_energy = 0.6 * t.supply_energy;
        t.load_energy = 0.9 * t.mode_energy;
        t.wall_loss = 0.1 * t.mode_energy;
        t.anode_energy = (0.35 - lost_energy) * t.supply_energy;
        t.cathode_energy = 0.05 * t.supply_energy;
        t.primaries = step <= 1000 ? 10 : 8;
        t.secondaries = 2;
        t.anode_hits = step <= 1000 ? 0 : 7;
        t.cathode_hits = step <= 1000 ? 0 : 3;
        in_flight += t.primaries + t.secondaries - t.anode_hits - t.cathode_hits;
        t.electrons = in_flight;
        return t;
    }

    void sample_into(Record& record) {
        const PolarGrid grid{deck.tube.cathode_radius, deck.tube.anode_radius, deck.tube.axial_height,
                             deck.grid.radial_cells, deck.grid.azimuthal_cells};
        node_charge.assign(grid.nodes(), 0.0);
        potential.assign(grid.nodes(), 0.0);
        for (int i = 0; i <= grid.n_r; ++i) {
            for (int j = 0; j < grid.n_theta; ++j) {
                // Density 1 up to mid-gap, 0.25 beyond, with spokes: 1 + 2 b cos m theta has |Q_m| / Q_0 = b.
                const double density = 2 * i < grid.n_r ? 1 : 0.25;
                const double wave = 1 + 2 * bunching * std::cos(spokes * grid.theta(j));
                node_charge[grid.node(i, j)] = -1e-13 * density * wave * grid.node_volume(i) / grid.node_volume(0);
            }
        }
        const double time = static_cast<double>(step) * deck.clock.step;
        std::vector<ModeState> modes;
        for (std::size_t k = 0; k < deck.circuit.modes.size(); ++k) {
            const ModeEntry& mode = deck.circuit.modes[k];
            const double amplitude = mode_voltage[k](time);
            const auto turning = std::polar(amplitude, 2 * kPi * mode_frequency[k] * time);
            const double energy = 0.5 * mode.capacitance * amplitude * amplitude;
            modes.push_back({mode.number, mode.frequency, mode.capacitance, 2 * mode.number == deck.tube.vane_count,
                             turning, 0.0, energy});
        }
        record.sample({time, grid, macro_charge, 60000, node_charge, potential, modes, 0, 0, 0, 0.001,
                       in_flight + stray_electrons, in_flight, books});
    }

    /// Steps until `until` (s) with the deck's samples.
    void play(Record& record, double until) {
        while (static_cast<double>(step) * deck.clock.step < until - 0.5 * deck.clock.step) {
            record.add(tally());
            if (step % deck.clock.sample_every == 0) sample_into(record);
        }
    }
};

}  // namespace spokewright
