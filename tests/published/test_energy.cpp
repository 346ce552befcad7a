// SPDX-License-Identifier: MIT
// Source: H. R. Lewis, J. Comput. Phys. 6, 136 (1970): a force that is the gradient of the interpolated potential does
// the work the potential says. Conservation of energy from the supply to the heat and the load.
#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <random>
#include <vector>

#include "pic/force_table.hpp"
#include "tests/fitted_order.hpp"
#include "tests/published_row.hpp"
#include "tests/smooth_bore.hpp"

using namespace spokewright;

namespace {

// A coarse grid with strong curvature: cells of a third of the cathode radius.
const StepUnits kUnits{{2e-3, 8e-3, 10e-3, 9, 12}, 1e-12};

std::vector<double> random_potential() {
    std::mt19937 random(1);
    std::uniform_real_distribution<double> volt(-1000, 1000);
    std::vector<double> potential(kUnits.grid.nodes());
    std::generate(potential.begin(), potential.end(), [&] { return volt(random); });
    return potential;
}

/// Work of the radial force through cell (i, j) at azimuthal share t, V: Simpson's rule, exact for these parabolas.
double radial_work(const ForceTable& force, int i, int j, double t) {
    const CellForce& cell =
        force.cells()[static_cast<std::size_t>(i) * kUnits.cell_stride() + static_cast<std::size_t>(j)];
    const auto kick = [&](double f) {
        return (static_cast<double>(cell.radial) + static_cast<double>(cell.radial_rise) * t) *
               (1 + static_cast<double>(cell.slope) * (f - 0.5));
    };
    return (kick(0) + 4 * kick(0.5) + kick(1)) / 6 / kUnits.half_kick(1) * kUnits.grid.dr();
}

/// Work of the azimuthal force along the inner arc of cell (i, j), V.
double azimuthal_work(const ForceTable& force, int i, int j) {
    const CellForce& cell =
        force.cells()[static_cast<std::size_t>(i) * kUnits.cell_stride() + static_cast<std::size_t>(j)];
    return static_cast<double>(cell.along) / kUnits.half_kick(1) * kUnits.grid.radius(i) * kUnits.grid.dtheta();
}

/// A surface field that shapes the first cell as space-charge-limited emission does.
SurfaceField limited_surface(const std::vector<double>& potential) {
    SurfaceField surface(kUnits.grid);
    const Poisson poisson(kUnits.grid);
    std::vector<double> charge(kUnits.grid.nodes(), 0.0);
    const double flux = kVacuumPermittivity * kUnits.grid.axial_height * kUnits.grid.dtheta() * poisson.conductance(0);
    for (std::size_t j = 0; j < 12; ++j) {
        charge[j] = flux * (potential[j] - potential[12 + j]);  // no field on the surface
    }
    surface.update(poisson, potential, charge);
    return surface;
}

struct Energy {
    double in = 0, out = 0;

    void add(const Tally& t) {
        in += t.supply_energy + t.prime_energy + t.emission_energy;
        out += t.wall_loss + t.load_energy + t.anode_energy + t.cathode_energy;
    }
    double imbalance(const SpaceView& view) const {
        const double stored = view.kinetic_energy + view.space_charge_energy + view.resonator_energy;
        return std::abs(in - out - stored) / in;
    }
};

}  // namespace

TEST_CASE("the force does the work that the potential says") {
    const std::vector<double> potential = random_potential();
    const std::vector<double> magnetic(10, 0.0);
    const SurfaceField surface = limited_surface(potential);
    CHECK(surface.surface_share() == SurfaceField::kLimitedShare);
    ForceTable force(kUnits);
    force.update(potential, surface, magnetic);
    double worst = 0;
    for (int j = 0; j < 12; ++j) {
        const int next = (j + 1) % 12;
        for (int i = 0; i < 9; ++i) {
            for (const double t : {0.0, 0.3, 1.0}) {
                const double inner =
                    (1 - t) * potential[kUnits.grid.node(i, j)] + t * potential[kUnits.grid.node(i, next)];
                const double outer =
                    (1 - t) * potential[kUnits.grid.node(i + 1, j)] + t * potential[kUnits.grid.node(i + 1, next)];
                worst = std::max(worst, std::abs(radial_work(force, i, j, t) - (inner - outer)));
            }
            // Once around the cell along its edges: the two rays and the two arcs.
            const double drop = potential[kUnits.grid.node(i, j)] - potential[kUnits.grid.node(i, next)];
            worst = std::max(worst, std::abs(azimuthal_work(force, i, j) - drop));
        }
    }
    MESSAGE("worst work error " << worst << " V of 2000");
    CHECK(worst < 2e-3);  // single-precision coefficients: some roundings of 6e-8 of 2000 V
}

/// Of a smooth bore 3 % below cutoff, after 8 ns.
double imbalance_of_bore(double step, int radial_cells) {
    Deck deck = smooth_bore(1.95e-3, 4.45e-3, 4100, 0.1132);
    deck.supply.programme = {{0, 0}, {2e-9, 1}};
    deck.cathode.launch_temperature = 0.1;
    deck.clock.step = step;
    deck.grid.radial_cells = radial_cells;
    InteractionSpace space(deck);
    Energy energy;
    while (space.time() < 8e-9) {
        energy.add(space.step());
    }
    return energy.imbalance(space.view());
}

TEST_CASE("energy imbalance of a hot run: conducting smooth bore, second order in the step, whatever the cells") {
    std::vector<double> step, open;
    for (const double dt : {4e-12, 2e-12, 1e-12}) {
        step.push_back(dt);
        open.push_back(imbalance_of_bore(dt, 48));
        MESSAGE(dt << " s: imbalance " << open.back());
    }
    check_published({"energy open in a hot run of a conducting smooth bore, 2 ps, share of the input",
                     "conservation of energy", 0, open[1], 1e-3, "5e-3 is required; the time step is left"});
    check_published({"order of the open energy in the step", "leapfrog (J. P. Boris 1970)", 2, fitted_order(step, open),
                     0.05, "three steps"});
    check_published({"energy open on half as many radial cells over that on 48",
                     "energy-conserving force (H. R. Lewis, J. Comput. Phys. 6, 136 (1970))", 1,
                     imbalance_of_bore(2e-12, 24) / open[1], 0.15, "other noise in the flow"});
}

TEST_CASE("energy imbalance of a hot run: pi mode with ten vanes") {
    Deck deck = smooth_bore(2e-3, 4.6e-3, 4150, 0.175);
    deck.tube.vane_count = 10;
    deck.supply.programme = {{0, 0}, {5e-9, 1}};
    deck.circuit.source = CircuitSource::table;
    deck.circuit.modes = {{5, 2.45e9, 1500, 165, 1e-12}};
    deck.prime = {5, 600, 8e-9};
    deck.cathode.launch_temperature = 1;
    deck.grid = {48, 160};
    deck.clock.step = 3e-12;
    deck.electrons.target_count = 10000;
    InteractionSpace space(deck, 1);
    Energy energy;
    double modes = 0;
    for (int k = 0; k < 12000; ++k) {
        const Tally& tally = space.step();
        energy.add(tally);
        modes += tally.mode_energy;
    }
    MESSAGE("imbalance " << energy.imbalance(space.view()) << ", to the mode " << modes / energy.in);
    CHECK(modes / energy.in > 0.3);  // it does oscillate
    check_published({"energy open in a hot run of a ten-vane tube in the pi mode", "conservation of energy", 0,
                     energy.imbalance(space.view()), 1e-3, "5e-3 is required; the time step is left"});
}
