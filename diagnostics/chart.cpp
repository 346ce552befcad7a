// SPDX-License-Identifier: MIT
#include "diagnostics/chart.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <cstdlib>
#include <limits>

#include "diagnostics/current_estimate.hpp"
#include "diagnostics/theory.hpp"
#include "fields/resonators.hpp"
#include "inputs/constants.hpp"

namespace spokewright {
namespace {

constexpr double kUnknown = std::numeric_limits<double>::quiet_NaN();
constexpr ChartValue kNoValue{kUnknown, kUnknown};

ChartWave wave_of(const Chart& chart, const ModeEntry& mode, int k) {
    const double r_c = chart.cathode_radius;
    const double r_a = chart.anode_radius;
    const double f = mode.frequency;
    const int harmonic = mode.number + k * chart.vane_count;
    const int m = std::abs(harmonic);
    ChartWave wave{mode.number,
                   k,
                   harmonic,
                   f,
                   {synchronous_voltage_relativistic(r_a, m, f), synchronous_voltage(r_a, m, f)},
                   {synchronous_field_relativistic(r_c, r_a, m, f), synchronous_field(r_c, r_a, m, f)},
                   kNoValue};
    if (chart.field > wave.synchronous_field.value) {
        wave.hartree_voltage = {hartree_voltage(chart.field, r_c, r_a, m, f),
                                hartree_voltage_nonrelativistic(chart.field, r_c, r_a, m, f)};
    }
    return wave;
}

void add_waves(Chart& chart, const Deck& deck) {
    for (const ModeEntry& mode : deck.circuit.modes) {
        const bool is_pi = 2 * mode.number == chart.vane_count;
        for (const int k : {0, -1, 1}) {
            if (is_pi && k == -1) continue;  // m = -n, the same speed
            chart.waves.push_back(wave_of(chart, mode, k));
        }
    }
}

std::string missing_pi_mode(const Deck& deck) {
    const int vanes = deck.tube.vane_count;
    if (vanes == 0) return "no modes: tube.vane_count = 0";
    if (deck.circuit.modes.empty()) return "no circuit: set circuit.source = table";
    if (vanes % 2 == 1) return fmt::format("an odd block of {} vanes has no pi mode", vanes);
    if (std::ranges::count(deck.circuit.modes, vanes / 2, &ModeEntry::number) == 0) {
        return fmt::format("the pi mode {} is not in circuit.mode_numbers", vanes / 2);
    }
    return "";
}

/// From the pi mode's threshold to the next of another mode, or to the Hull voltage.
VoltageWindow window_of(const Chart& chart, bool with_harmonics) {
    VoltageWindow window{chart.pi.hartree_voltage.value, chart.hull_voltage.value, 0, 0, {}};
    if (std::isnan(window.low)) window.high = kUnknown;
    for (const ChartWave& wave : chart.waves) {
        if (wave.mode == chart.pi.mode || (wave.k != 0 && !with_harmonics)) continue;
        const double threshold = wave.hartree_voltage.value;
        if (threshold <= window.low * (1 + 1e-9)) {  // two equal speeds may round apart
            window.below.push_back(wave);
        } else if (threshold < window.high) {
            window.high = threshold;
            window.limiting_mode = wave.mode;
            window.limiting_harmonic = wave.harmonic;
        }
    }
    return window;
}

void fill_pi_mode(Chart& chart, const Deck& deck, const ModeEntry& mode) {
    const ChartValue v0 = chart.pi.synchronous_voltage;
    const auto bound = [&](double (*of)(double, double)) -> ChartValue {
        const ChartValue value{of(chart.voltage, v0.value), of(chart.voltage, v0.nonrelativistic)};
        return value.value > 0 ? value : kNoValue;
    };
    chart.drift_bound = bound(drift_efficiency_bound);
    chart.cycloid_bound = bound(cycloid_efficiency_bound);
    const double external_q = mode.external_q / load_admittance(deck.load).real();
    chart.loaded_q = loaded_q(mode.unloaded_q, external_q);
    chart.circuit_efficiency = circuit_efficiency(mode.unloaded_q, external_q);
    chart.total_bound = chart.drift_bound.value * chart.circuit_efficiency;
    chart.pulling_figure = pulling_figure(mode.frequency, mode.external_q, 1.5);
    chart.electrical_radius = electrical_radius(chart.anode_radius, mode.frequency);
    chart.wave_beta = chart.electrical_radius / mode.number;
}

void fill_smooth_bore(Chart& chart) {
    const double r_c = chart.cathode_radius;
    const double r_a = chart.anode_radius;
    chart.hull_field = {hull_field(chart.voltage, r_c, r_a), hull_field_nonrelativistic(chart.voltage, r_c, r_a)};
    chart.limited_current = {
        chart.height * space_charge_limited_current_per_length_relativistic(chart.voltage, r_c, r_a),
        chart.height * space_charge_limited_current_per_length(chart.voltage, r_c, r_a)};
    chart.electron_gamma = electron_gamma(chart.voltage);
    chart.electron_beta = electron_speed(chart.voltage) / kLightSpeed;
    chart.hull_voltage = chart.hub_radius = chart.hub_speed = chart.hub_charge = kNoValue;
    chart.above_hull = chart.field == 0;
    if (chart.field == 0) return;
    chart.cyclotron_frequency = cyclotron_frequency(chart.field) / (2 * kPi);
    chart.hull_voltage = {hull_voltage(chart.field, r_c, r_a), hull_voltage_nonrelativistic(chart.field, r_c, r_a)};
    chart.above_hull = chart.voltage >= chart.hull_voltage.value;
    if (chart.above_hull) return;
    const BrillouinHub hub = brillouin_hub_relativistic(chart.field, r_c, r_a, chart.voltage);
    const BrillouinHub slow = brillouin_hub(chart.field, r_c, r_a, chart.voltage);
    chart.hub_radius = {hub.radius, slow.radius};
    chart.hub_speed = {hub.edge_speed, slow.edge_speed};
    chart.hub_charge = {hub.charge_per_length * chart.height, slow.charge_per_length * chart.height};
}

}  // namespace

Chart operating_chart(const Deck& deck) {
    Chart chart{};
    chart.tube_name = deck.tube.name;
    chart.deck_path = deck.path;
    chart.deck_sha256 = deck.sha256;
    chart.voltage = deck.supply.anode_voltage;
    chart.field = mean_field(deck);
    chart.field_from_table = !deck.magnet.table.empty();
    chart.cathode_radius = deck.tube.cathode_radius;
    chart.anode_radius = deck.tube.anode_radius;
    chart.height = deck.tube.axial_height;
    chart.vane_count = deck.tube.vane_count;
    fill_smooth_bore(chart);

    add_waves(chart, deck);
    chart.no_pi_mode = missing_pi_mode(deck);
    chart.pi = {0, 0, 0, kUnknown, kNoValue, kNoValue, kNoValue};
    chart.drift_bound = chart.cycloid_bound = kNoValue;
    chart.loaded_q = chart.circuit_efficiency = chart.total_bound = chart.pulling_figure = kUnknown;
    chart.electrical_radius = chart.wave_beta = kUnknown;
    if (chart.no_pi_mode.empty()) {
        const ModeEntry& mode = *std::ranges::find(deck.circuit.modes, chart.vane_count / 2, &ModeEntry::number);
        chart.pi = wave_of(chart, mode, 0);
        fill_pi_mode(chart, deck, mode);
    }
    chart.window = window_of(chart, false);
    chart.harmonic_window = window_of(chart, true);

    chart.expected_current = expected_current(deck);
    chart.cathode_supply = cathode_supply(deck);
    chart.secondary_emission = deck.cathode.secondary_emission;
    return chart;
}

}  // namespace spokewright
