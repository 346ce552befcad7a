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

/// sqrt(kT / m) in velocity units.
double thermal_speed(double temperature_eV, const StepUnits& units) {
    return std::sqrt(temperature_eV * kElementaryCharge / kElectronMass) / units.speed();
}

/// Cathode surface that belongs to one node, m^2.
double node_area(const PolarGrid& grid) {
    return grid.cathode_radius * grid.dtheta() * grid.axial_height;
}

}  // namespace

Cathode::Cathode(const Deck& deck, const StepUnits& units, double macro_charge)
    : settings_(deck.cathode),
      units_(units),
      random_(deck.electrons.seed),
      macro_charge_(macro_charge),
      energy_of_(units.energy_scale()),
      primary_speed_(thermal_speed(deck.cathode.launch_temperature, units)),
      secondary_speed_(thermal_speed(deck.cathode.secondary_temperature, units)),
      field_to_kick_(units.half_kick(1)),
      field_to_count_(kVacuumPermittivity * node_area(units.grid) / macro_charge),
      density_to_count_(node_area(units.grid) * units.dt / std::abs(macro_charge)),
      inverse_arc_(1 / (units.cathode_cells() * units.grid.dtheta())),
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
    for (std::size_t j = 0; j < surface.on_surface().size(); ++j) {
        const double field = surface.on_surface()[j];
        const double wanted = std::min(field_to_count_ * field - secondaries_at_node_[j], allowance(-field));
        if (wanted <= 0) {
            continue;
        }
        const auto place = static_cast<std::uint32_t>(j);
        const std::int64_t count = round_at_random(wanted, random_.uniform(step, Draw::emission_count, place, 0)[0]);
        for (std::int64_t k = 0; k < count; ++k) {
            const auto index = static_cast<std::uint32_t>(k);
            const Uniforms random = random_.uniform(step, Draw::emission, place, index);
            // Anywhere in the sector of half a cell on either side of the node.
            const double cells = static_cast<double>(j) + static_cast<double>(random[4]) - 0.5;
            launch(static_cast<std::int32_t>(std::lrint(cells * kAzimuthalOne)), j, primary_speed_, random, surface,
                   store);
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
            launch(impact.theta, node, secondary_speed_, random_.uniform(step, Draw::secondary, place, index), surface,
                   store);
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
    return density * density_to_count_;
}

void Cathode::launch(std::int32_t theta, std::size_t node, double thermal, const Uniforms& random,
                     const SurfaceField& surface, ElectronStore& store) {
    // Single precision for the draws: they have 23 bits.
    const float circle = static_cast<float>(2 * kPi);
    const double normal = thermal * static_cast<double>(std::sqrt(-2 * std::log(random[0])));
    const double tangential =
        thermal * static_cast<double>(std::sqrt(-2 * std::log(random[1])) * std::cos(circle * random[2]));
    energy_eV_ += energy_of_(normal * normal + tangential * tangential);

    const double flown =
        1 - static_cast<double>(random[3]);  // share of the step after the launch: where r stands at n + 1
    const double carried = flown - 0.5;      // and from the launch to n + 1/2, where u stands
    const double kick = field_to_kick_ * surface.surface_share() * surface.first_cell()[node];
    const double rise_to_u = normal * carried + kick * carried * carried;
    const double rise = normal * flown + kick * flown * flown;

    Electron electron{};
    electron.u_r = static_cast<float>(normal + 2 * kick * carried);
    // du_theta/dt = -(q B / m) dr/dt: the canonical angular momentum stays that of the surface.
    electron.u_theta = static_cast<float>(tangential - turn_ * rise_to_u);
    electron.r = std::max<std::int32_t>(1, static_cast<std::int32_t>(std::lrint(rise * kRadialOne)));
    const double drift = tangential * flown * inverse_arc_;
    std::int32_t place = theta + static_cast<std::int32_t>(std::lrint(drift * kAzimuthalOne));
    place += place < 0 ? units_.azimuthal_end() : 0;
    place -= place >= units_.azimuthal_end() ? units_.azimuthal_end() : 0;
    electron.theta = place;
    store.append(electron);
}

}  // namespace spokewright
