// SPDX-License-Identifier: MIT
// Electrons that drift round a smooth bore far below cutoff, in random order, and their field: the same cloud for the
// fast step and for the plain ones in tests/oracle. The potential varies with the angle too, so that no term is idle.
#pragma once

#include <cmath>
#include <random>
#include <vector>

#include "fields/surface_field.hpp"
#include "pic/electron_store.hpp"
#include "pic/force_table.hpp"
#include "tests/oracle/reference_step.hpp"
#include "tests/oracle/tuned_step.hpp"

namespace spokewright {

struct DriftingCloud {
    DriftingCloud(int n_r, int n_theta, std::size_t electrons, double voltage = 4000)
        : units{{1.95e-3, 4.45e-3, 9.5e-3, n_r, n_theta}, 3e-12}, surface(units.grid), force(units) {
        const PolarGrid& grid = units.grid;
        potential.resize(grid.nodes());
        for (int i = 0; i <= n_r; ++i) {
            const double share =
                std::log(grid.radius(i) / grid.cathode_radius) / std::log(grid.anode_radius / grid.cathode_radius);
            magnetic.push_back(0.18 * (1 + 0.05 * share));
            for (int j = 0; j < n_theta; ++j) {
                potential[grid.node(i, j)] = voltage * share * (1 + 0.03 * share * std::cos(5 * grid.theta(j)));
            }
        }
        force.update(potential, surface, magnetic);
        std::mt19937 random(1);
        std::uniform_real_distribution<double> uniform(0, 1);
        for (std::size_t p = 0; p < electrons; ++p) {
            // Cycloids of some 0.6 mm in a gap of 2.5 mm.
            store.append({static_cast<std::int32_t>((0.25 + 0.4 * uniform(random)) * units.radial_end()),
                          static_cast<std::int32_t>(uniform(random) * units.azimuthal_end()),
                          static_cast<float>(0.1 * (uniform(random) - 0.5)),
                          static_cast<float>(0.1 * (uniform(random) - 0.5))});
        }
    }

    oracle::Electrons reference_electrons() const {
        oracle::Electrons all;
        for (std::size_t p = 0; p < store.size(); ++p) {
            all.r.push_back(units.grid.cathode_radius + store.r[p] * (units.grid.dr() / kRadialOne));
            all.theta.push_back(store.theta[p] * (units.grid.dtheta() / kAzimuthalOne));
            all.u_r.push_back(static_cast<double>(store.u_r[p]) * units.speed());
            all.u_theta.push_back(static_cast<double>(store.u_theta[p]) * units.speed());
        }
        return all;
    }

    oracle::TunedElectrons tuned_electrons() const {
        oracle::TunedElectrons all;
        for (std::size_t p = 0; p < store.size(); ++p) {
            all.r.push_back(store.r[p] * (1.0 / kRadialOne));
            all.theta.push_back(store.theta[p] * (1.0 / kAzimuthalOne));
            all.u_r.push_back(static_cast<double>(store.u_r[p]));
            all.u_theta.push_back(static_cast<double>(store.u_theta[p]));
        }
        return all;
    }

    StepUnits units;
    std::vector<double> potential;  // V, [n_r + 1][n_theta]
    std::vector<double> magnetic;   // T, [n_r + 1]
    SurfaceField surface;           // of a vacuum: share 1
    ForceTable force;
    ElectronStore store;
};

}  // namespace spokewright
