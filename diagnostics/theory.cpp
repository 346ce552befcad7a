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
    if (voltage >= brillouin_voltage(field, r_c, r_a, r_a)) return r_a;
    double low = r_c;
    double high = r_a;
    // d V / d r_b is proportional to r_b (1 + (r_c / r_b)^4) ln(r_a / r_b) > 0, so bisection cannot miss the root.
    while (high - low > 1e-14 * (r_a - r_c)) {
        const double middle = 0.5 * (low + high);
        if (middle <= low || middle >= high) break;  // neighbouring doubles
        (brillouin_voltage(field, r_c, r_a, middle) < voltage ? low : high) = middle;
    }
    return 0.5 * (low + high);
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

double child_langmuir_current_density(double voltage, double gap) {
    return 4 * kVacuumPermittivity / 9 * std::sqrt(2 * kChargeToMass) * std::pow(voltage, 1.5) / (gap * gap);
}

}  // namespace spokewright
