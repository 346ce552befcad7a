// SPDX-License-Identifier: MIT
#include "pic/electron_sums.hpp"

#include <doctest/doctest.h>

#include "tests/drifting_cloud.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

TEST_CASE("kinetic energy is that of the momentum half an electric kick later") {
    DriftingCloud cloud(48, 160, 2500);
    ElectronSums sums(cloud.units);
    const double found = sums.kinetic_energy_eV(cloud.store, cloud.force);
    const double expected = [&] {
        double sum = 0;
        for (std::size_t p = 0; p < cloud.store.size(); ++p) {
            const double r = cloud.store.r[p] * (1.0 / kRadialOne),
                         theta = cloud.store.theta[p] * (1.0 / kAzimuthalOne);
            const auto i = static_cast<std::size_t>(r), j = static_cast<std::size_t>(theta);
            const CellForce& cell = cloud.force.cells()[i * cloud.units.cell_stride() + j];
            const double f = r - std::floor(r), t = theta - std::floor(theta);
            const double s = f + static_cast<double>(cell.bend) * f * (f - 1);
            const double u_r = static_cast<double>(cloud.store.u_r[p]) +
                               (static_cast<double>(cell.radial) + static_cast<double>(cell.radial_rise) * t) *
                                   (1 + static_cast<double>(cell.slope) * (f - 0.5));
            const double u_theta = static_cast<double>(cloud.store.u_theta[p]) + static_cast<double>(cell.along) +
                                   static_cast<double>(cell.along_rise) * s;
            sum += cloud.units.energy_scale()(u_r * u_r + u_theta * u_theta);
        }
        return sum;
    }();
    CHECK(found > 0);
    CHECK(relative_error(found, expected) < 1e-7);  // single-precision terms, whose roundings cancel in the sum
}

TEST_CASE("angular speed is shared between rows like the charge") {
    const StepUnits units{{2e-3, 4e-3, 10e-3, 10, 24}, 1e-12};  // r_c is 10 cells
    ElectronSums sums(units);
    ElectronStore store;
    store.append({5 * kRadialOne / 2, 7 * kAzimuthalOne, 0.5f, 0.25f});  // 2.5 cells out: rows 2 and 3
    std::vector<double> rows(11, 0.0);
    sums.add_angular_speed(store, rows);
    const double gamma = std::sqrt(1 + 0.3125 / (units.light() * units.light()));
    const double turning = 0.25 / (gamma * 12.5) / units.dt;
    const double area = (12.5 * 12.5 - 12 * 12) / (13 * 13 - 12 * 12);
    CHECK(relative_error(rows[2], turning * (1 - area)) < 1e-6);  // single precision
    CHECK(relative_error(rows[3], turning * area) < 1e-6);
    CHECK(rows[1] == 0);
    CHECK(rows[4] == 0);
}

TEST_CASE("sums are the same to the last bit on every instruction set and number of threads") {
    const DriftingCloud cloud(48, 160, 2501);
    const auto totals = [&](int threads, InstructionSet set) {
        ElectronSums sums(cloud.units, threads, set);
        std::vector<double> rows(49, 0.0);
        sums.add_angular_speed(cloud.store, rows);
        rows.push_back(sums.kinetic_energy_eV(cloud.store, cloud.force));
        return rows;
    };
    for (const InstructionSet set : instruction_sets()) {
        CHECK(totals(1, set) == totals(1, InstructionSet::plain));
    }
    CHECK(totals(3, fastest_instruction_set()) == totals(1, fastest_instruction_set()));
}

TEST_CASE("no electrons, no energy") {
    const DriftingCloud cloud(48, 160, 0);
    CHECK(ElectronSums(cloud.units).kinetic_energy_eV(cloud.store, cloud.force) == 0);
}
