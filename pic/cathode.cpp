// SPDX-License-Identifier: MIT
#include "pic/cathode.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

#include "diagnostics/cathode_laws.hpp"

namespace spokewright {
namespace {

/// An integer whose mean is `expected`; `uniform` in (0, 1).
std::int64_t round_at_random(double expected, float uniform) {
    return static_cast<std::int64_t>(std::floor(expected + static_cast<double>(uniform)));
}

}  // namespace

Cathode::Cathode(const Deck& deck, const StepUnits& units, double macro_charge)
    : settings_(deck.cathode),
      units_(units),
      random_(deck.electrons.seed),
      macro_charge_(macro_charge),
      secondaries_at_node_(static_cast<std::size_t>(units.grid.n_theta)) {}

void Cathode::emit(std::int64_t step, const SurfaceField& surface, double magnetic,
                   std::span<const CathodeImpact> impacts, ElectronStore& store) {
    turn_ = 2 * units_.half_turn(magnetic);
    primaries_ = secondaries_ = 0;
    energy_eV_ = 0;
    std::fill(secondaries_at_node_.begin(), secondaries_at_node_.end(), 0.0);
    if (settings_.secondary_emission) {
        emit_secondaries(step, surface, impacts, store);
    }
    const PolarGrid& grid = units_.grid;
    const double field_to_count =
        kVacuumPermittivity * grid.axial_height * grid.cathode_radius * grid.dtheta() / macro_charge_;
    for (std::size_t j = 0; j < surface.on_surface().size(); ++j) {
        const double field = surface.on_surface()[j];
        const double wanted = std::min(field_to_count * field - secondaries_at_node_[j], allowance(-field));
        if (wanted <= 0) {
            continue;
        }
        const auto place = static_cast<std::uint32_t>(j);
        const std::int64_t count = round_at_random(wanted, random_.uniform(step, Draw::emission_count, place, 0)[0]);
        for (std::int64_t k = 0; k < count; ++k) {
            const auto index = static_cast<std::uint32_t>(k);
            const auto where = random_.uniform(step, Draw::emission_state, place, index);
            const auto speed = random_.uniform(step, Draw::emission_velocity, place, index);
            // Anywhere in the sector of half a cell on either side of the node.
            const double cells = static_cast<double>(j) + static_cast<double>(where[0]) - 0.5;
            launch(static_cast<std::int32_t>(std::lrint(cells * kAzimuthalOne)), j, settings_.launch_temperature,
                   static_cast<double>(where[1]), speed, surface, store);
        }
        primaries_ += count;
    }
}

void Cathode::emit_secondaries(std::int64_t step, const SurfaceField& surface, std::span<const CathodeImpact> impacts,
                               ElectronStore& store) {
    const SecondarySurface law{settings_.secondary_yield_max, settings_.secondary_energy_max,
                               settings_.secondary_roughness};
    for (std::size_t hit = 0; hit < impacts.size(); ++hit) {
        const CathodeImpact& impact = impacts[hit];
        const double yield =
            secondary_yield(law, static_cast<double>(impact.energy), static_cast<double>(impact.angle));
        const auto place = static_cast<std::uint32_t>(hit);
        const std::int64_t count = round_at_random(yield, random_.uniform(step, Draw::secondary_count, place, 0)[0]);
        const auto node = static_cast<std::size_t>((impact.theta + kAzimuthalOne / 2) >> kAzimuthalBits) %
                          secondaries_at_node_.size();
        for (std::int64_t k = 0; k < count; ++k) {
            const auto index = static_cast<std::uint32_t>(k);
            const auto instant = random_.uniform(step, Draw::secondary_state, place, index)[0];
            launch(impact.theta, node, settings_.secondary_temperature, static_cast<double>(instant),
                   random_.uniform(step, Draw::secondary_velocity, place, index), surface, store);
        }
        secondaries_at_node_[node] += static_cast<double>(count);
        secondaries_ += count;
    }
}

double Cathode::allowance(double pulling_field) const {
    double density = std::numeric_limits<double>::infinity();  // A/m^2
    if (settings_.emission == EmissionLaw::thermionic) {
        density = thermionic_current_density(settings_.richardson_constant, settings_.temperature,
                                             settings_.work_function, pulling_field);
    }
    if (settings_.emission_limit > 0) {
        density = std::min(density, settings_.emission_limit);
    }
    const PolarGrid& grid = units_.grid;
    const double area = grid.cathode_radius * grid.dtheta() * grid.axial_height;
    return density * area * units_.dt / std::abs(macro_charge_);
}

void Cathode::launch(std::int32_t theta, std::size_t node, double temperature_eV, double instant,
                     const std::array<float, 4>& random, const SurfaceField& surface, ElectronStore& store) {
    const double thermal = std::sqrt(temperature_eV * kElementaryCharge / kElectronMass) / units_.speed();
    const double normal = thermal * std::sqrt(-2 * std::log(static_cast<double>(random[0])));
    const double tangential = thermal * std::sqrt(-2 * std::log(static_cast<double>(random[1]))) *
                              std::cos(2 * kPi * static_cast<double>(random[2]));
    energy_eV_ += units_.energy_eV(normal * normal + tangential * tangential);

    const double flown = 1 - instant;    // share of the step after the launch: where r stands at n + 1
    const double carried = flown - 0.5;  // and from the launch to n + 1/2, where u stands
    const double kick = units_.half_kick(surface.surface_share() * surface.first_cell()[node]);
    const double rise_to_u = normal * carried + kick * carried * carried;
    const double rise = normal * flown + kick * flown * flown;

    Electron electron{};
    electron.u_r = static_cast<float>(normal + 2 * kick * carried);
    // du_theta/dt = -(q B / m) dr/dt: the canonical angular momentum stays that of the surface.
    electron.u_theta = static_cast<float>(tangential - turn_ * rise_to_u);
    electron.r = std::max<std::int32_t>(1, static_cast<std::int32_t>(std::lrint(rise * kRadialOne)));
    const double drift = tangential * flown / (units_.cathode_cells() * units_.grid.dtheta());
    std::int32_t place = theta + static_cast<std::int32_t>(std::lrint(drift * kAzimuthalOne));
    place += place < 0 ? units_.azimuthal_end() : 0;
    place -= place >= units_.azimuthal_end() ? units_.azimuthal_end() : 0;
    electron.theta = place;
    store.append(electron);
}

}  // namespace spokewright
