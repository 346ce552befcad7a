// SPDX-License-Identifier: MIT
#include "diagnostics/theory.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

#include "inputs/constants.hpp"

namespace spokewright {
namespace {

constexpr double kChargeToMass = kElementaryCharge / kElectronMass;
constexpr double kRestVoltage = kElectronMass * kLightSpeed * kLightSpeed / kElementaryCharge;  // V, 511 kV

/// Hull's effective gap (r_a^2 - r_c^2) / (2 r_a).
double effective_gap(double r_c, double r_a) {
    return (r_a * r_a - r_c * r_c) / (2 * r_a);
}

/// Slope of b' in 3 b b'' + b'^2 + 4 b b' + b^2 = 1.
double beta_curvature(double b, double slope) {
    return (1 - slope * slope - 4 * b * slope - b * b) / (3 * b);
}

/// gamma beta of Brillouin flow at radius r, and its slope.
double brillouin_momentum(double field, double r_c, double r) {
    return kChargeToMass * field / (2 * kLightSpeed) * (r - r_c * r_c / r);
}
double brillouin_momentum_slope(double field, double r_c, double r) {
    return kChargeToMass * field / (2 * kLightSpeed) * (1 + r_c * r_c / (r * r));
}

/// Where a voltage that rises with the radius from 0 at r_c comes to `voltage`, m; r_a when it stays below.
template <typename Voltage>
double hub_radius(double r_c, double r_a, double voltage, Voltage voltage_of) {
    if (voltage >= voltage_of(r_a)) return r_a;
    double low = r_c;
    double high = r_a;
    while (high - low > 1e-14 * (r_a - r_c)) {
        const double middle = 0.5 * (low + high);
        if (middle <= low || middle >= high) break;  // neighbouring doubles
        (voltage_of(middle) < voltage ? low : high) = middle;
    }
    return 0.5 * (low + high);
}

}  // namespace

double cyclotron_frequency(double field) {
    return kChargeToMass * field;
}

double hull_voltage_nonrelativistic(double field, double r_c, double r_a) {
    const double momentum = field * effective_gap(r_c, r_a);
    return 0.5 * kChargeToMass * momentum * momentum;
}

double hull_voltage(double field, double r_c, double r_a) {
    const double u = kChargeToMass * field * effective_gap(r_c, r_a) / kLightSpeed;  // gamma beta at the anode
    return kRestVoltage * u * u / (std::sqrt(1 + u * u) + 1);                        // gamma - 1 without cancellation
}

double hull_field_nonrelativistic(double voltage, double r_c, double r_a) {
    return std::sqrt(2 * voltage / kChargeToMass) / effective_gap(r_c, r_a);
}

double hull_field(double voltage, double r_c, double r_a) {
    const double excess = voltage / kRestVoltage;  // gamma - 1
    return kLightSpeed / (kChargeToMass * effective_gap(r_c, r_a)) * std::sqrt(excess * (2 + excess));
}

double synchronous_voltage(double r_a, int n, double frequency) {
    const double velocity = 2 * kPi * frequency / n * r_a;
    return 0.5 * velocity * velocity / kChargeToMass;
}

double synchronous_voltage_relativistic(double r_a, int n, double frequency) {
    const double beta = 2 * kPi * frequency / n * r_a / kLightSpeed;
    if (beta >= 1) return std::numeric_limits<double>::quiet_NaN();
    const double root = std::sqrt(1 - beta * beta);
    return kRestVoltage * beta * beta / (root * (1 + root));  // gamma - 1 without cancellation
}

double synchronous_field(double r_c, double r_a, int n, double frequency) {
    const double wave = 2 * kPi * frequency / n;
    return 2 * wave / (kChargeToMass * (1 - r_c * r_c / (r_a * r_a)));
}

double synchronous_field_relativistic(double r_c, double r_a, int n, double frequency) {
    const double gamma = 1 + synchronous_voltage_relativistic(r_a, n, frequency) / kRestVoltage;
    return gamma * synchronous_field(r_c, r_a, n, frequency);
}

double drift_efficiency_bound(double voltage, double synchronous) {
    return 1 - synchronous / voltage;
}

double cycloid_efficiency_bound(double voltage, double synchronous) {
    return 1 - 2 * synchronous / voltage;
}

double electron_gamma(double voltage) {
    return 1 + voltage / kRestVoltage;
}

double electron_speed(double voltage) {
    const double excess = voltage / kRestVoltage;  // gamma - 1
    return kLightSpeed * std::sqrt(excess * (2 + excess)) / (1 + excess);
}

double electrical_radius(double r, double frequency) {
    return 2 * kPi * frequency * r / kLightSpeed;
}

double static_field_error(double electrical_radius, int n) {
    return electrical_radius * electrical_radius / (4 * (n + 1));
}

double hartree_voltage_nonrelativistic(double field, double r_c, double r_a, int n, double frequency) {
    const double wave = 2 * kPi * frequency / n;  // rad/s, W = omega / n
    return 0.5 * wave * field * (r_a * r_a - r_c * r_c) - synchronous_voltage(r_a, n, frequency);
}

double hartree_voltage(double field, double r_c, double r_a, int n, double frequency) {
    const double wave = 2 * kPi * frequency / n;
    const double beta = wave * r_a / kLightSpeed;
    if (beta >= 1) return std::numeric_limits<double>::quiet_NaN();
    const double deficit = beta * beta / (1 + std::sqrt(1 - beta * beta));  // 1 - sqrt(1 - beta^2)
    return 0.5 * wave * field * (r_a * r_a - r_c * r_c) - kRestVoltage * deficit;
}

double brillouin_voltage(double field, double r_c, double r_a, double r_b) {
    const double x = r_c * r_c / (r_b * r_b);
    const double shape = (1 - x) * (1 - x) + 2 * (1 - x * x) * std::log(r_a / r_b);
    return kChargeToMass * field * field * r_b * r_b / 8 * shape;
}

double brillouin_hub_radius(double field, double r_c, double r_a, double voltage) {
    // d V / d r_b is proportional to r_b (1 + (r_c / r_b)^4) ln(r_a / r_b) > 0, so bisection cannot miss the root.
    return hub_radius(r_c, r_a, voltage, [&](double r_b) { return brillouin_voltage(field, r_c, r_a, r_b); });
}

double brillouin_density(double field, double r_c, double r) {
    const double omega_c = cyclotron_frequency(field);
    const double x = r_c * r_c / (r * r);
    return kVacuumPermittivity * omega_c * omega_c / (2 * kElementaryCharge * kChargeToMass) * (1 + x * x);
}

double brillouin_charge_per_length(double field, double r_c, double r_b) {
    const double omega_c = cyclotron_frequency(field);
    const double area = r_b * r_b - r_c * r_c * r_c * r_c / (r_b * r_b);
    return kPi * kVacuumPermittivity * omega_c * omega_c / (2 * kChargeToMass) * area;
}

double brillouin_speed(double field, double r_c, double r) {
    return 0.5 * cyclotron_frequency(field) * (r - r_c * r_c / r);
}

BrillouinHub brillouin_hub(double field, double r_c, double r_a, double voltage) {
    const double r_b = brillouin_hub_radius(field, r_c, r_a, voltage);
    return {r_b, brillouin_speed(field, r_c, r_b), brillouin_charge_per_length(field, r_c, r_b)};
}

double brillouin_voltage_relativistic(double field, double r_c, double r_a, double r_b) {
    const double u = brillouin_momentum(field, r_c, r_b);
    const double gamma = std::sqrt(1 + u * u);
    const double flux = r_b * u * brillouin_momentum_slope(field, r_c, r_b) / gamma;  // r d gamma / d r at the edge
    return kRestVoltage * (u * u / (gamma + 1) + flux * std::log(r_a / r_b));
}

BrillouinHub brillouin_hub_relativistic(double field, double r_c, double r_a, double voltage) {
    const double r_b =
        hub_radius(r_c, r_a, voltage, [&](double r) { return brillouin_voltage_relativistic(field, r_c, r_a, r); });
    const double u = brillouin_momentum(field, r_c, r_b);
    const double gamma = std::sqrt(1 + u * u);
    const double edge_field = kRestVoltage * u * brillouin_momentum_slope(field, r_c, r_b) / gamma;  // V/m
    return {r_b, kLightSpeed * u / gamma, 2 * kPi * kVacuumPermittivity * r_b * edge_field};
}

double langmuir_blodgett_beta_squared(double radius_ratio) {
    const double end = std::log(radius_ratio);
    // The equation is singular at the cathode: start on the power series, whose next term is below 1e-8 of b there.
    double g = std::min(0.01, end);
    double b = g * (1 - g * (2.0 / 5 - g * (11.0 / 120 - g * 47.0 / 3300)));
    double slope = 1 - g * (4.0 / 5 - g * (11.0 / 40 - g * 47.0 / 825));
    while (g < end) {
        const double h = std::min({0.02 * g, 0.01, end - g});  // fine where b'' is steep
        const double k1 = beta_curvature(b, slope);
        const double k2 = beta_curvature(b + h / 2 * slope, slope + h / 2 * k1);
        const double k3 = beta_curvature(b + h / 2 * slope + h * h / 4 * k1, slope + h / 2 * k2);
        const double k4 = beta_curvature(b + h * slope + h * h / 2 * k2, slope + h * k3);
        b += h * slope + h * h / 6 * (k1 + k2 + k3);
        slope += h / 6 * (k1 + 2 * k2 + 2 * k3 + k4);
        g = end - g > h ? g + h : end;
    }
    return b * b;
}

double space_charge_limited_current_per_length(double voltage, double r_c, double r_a) {
    const double perveance = 8 * kPi * kVacuumPermittivity / 9 * std::sqrt(2 * kChargeToMass);
    return perveance * std::pow(voltage, 1.5) / (r_a * langmuir_blodgett_beta_squared(r_a / r_c));
}

namespace {

/// gamma - 1 at r_a of a flow that leaves the cathode at rest without field there, at I per length. With g = ln(r /
/// r_c) Poisson's equation reads d^2 gamma / d g^2 = K r gamma / sqrt(gamma^2 - 1), K = e I / (2 pi eps0 m c^3).
double gamma_excess_at_anode(double current, double r_c, double r_a) {
    const double end = std::log(r_a / r_c);
    const double strength = current / (2 * kPi * kVacuumPermittivity * kRestVoltage * kLightSpeed) * r_c;
    const auto bend = [&](double g, double excess) {
        return strength * std::exp(g) * (1 + excess) / std::sqrt(excess * (2 + excess));
    };
    // Start where the electrons are slow, on Langmuir and Blodgett: excess^1.5 goes as r beta^2, beta = g - 2/5 g^2.
    double g = 1e-4 * std::min(end, 1.0);
    const double beta = g * (1 - 0.4 * g);
    double excess = std::pow(9 * strength * std::exp(g) * beta * beta / (4 * std::sqrt(2.0)), 2.0 / 3);
    double slope = 2.0 / 3 * excess * (1 + 2 * (1 - 0.8 * g) / beta);
    while (g < end) {
        const double h = std::min({0.02 * g, 0.01, end - g});
        const double k1 = bend(g, excess);
        const double k2 = bend(g + h / 2, excess + h / 2 * slope);
        const double k3 = bend(g + h / 2, excess + h / 2 * slope + h * h / 4 * k1);
        const double k4 = bend(g + h, excess + h * slope + h * h / 2 * k2);
        excess += h * slope + h * h / 6 * (k1 + k2 + k3);
        slope += h / 6 * (k1 + 2 * k2 + 2 * k3 + k4);
        g = end - g > h ? g + h : end;
    }
    return excess;
}

}  // namespace

double space_charge_limited_current_per_length_relativistic(double voltage, double r_c, double r_a) {
    double current = space_charge_limited_current_per_length(voltage, r_c, r_a);
    // The voltage goes nearly as the current to 2/3, so each round gains digits.
    for (int round = 0; round < 60; ++round) {
        const double off = voltage / kRestVoltage / gamma_excess_at_anode(current, r_c, r_a);
        current *= std::pow(off, 1.5);
        if (std::abs(off - 1) < 1e-12) break;
    }
    return current;
}

double child_langmuir_current_density(double voltage, double gap) {
    return 4 * kVacuumPermittivity / 9 * std::sqrt(2 * kChargeToMass) * std::pow(voltage, 1.5) / (gap * gap);
}

double quality_factor(double frequency, double capacitance, double conductance) {
    return 2 * kPi * frequency * capacitance / conductance;
}

double loaded_q(double unloaded_q, double external_q) {
    return 1 / (1 / unloaded_q + 1 / external_q);
}

double circuit_efficiency(double unloaded_q, double external_q) {
    return loaded_q(unloaded_q, external_q) / external_q;
}

double pulling_figure(double frequency, double external_q, double vswr) {
    return frequency / (2 * external_q) * (vswr - 1 / vswr);
}

}  // namespace spokewright
