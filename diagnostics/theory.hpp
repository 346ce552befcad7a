// SPDX-License-Identifier: MIT
// Closed forms of a smooth-bore magnetron and of a diode: what the electrons may and may not do. SI units; r_c and r_a
// are the cathode and anode radius, 0 < r_c < r_a; fields and voltages are not negative.
#pragma once

namespace spokewright {

/// e B / m, rad/s.
double cyclotron_frequency(double field);

/// Anode voltage at which an electron from rest just reaches the anode, V. Exact for axisymmetric flow with any space
/// charge. A. W. Hull, Phys. Rev. 18, 31 (1921); relativistic: R. V. Lovelace & E. Ott, Phys. Fluids 17, 1263 (1974).
double hull_voltage(double field, double r_c, double r_a);
double hull_voltage_nonrelativistic(double field, double r_c, double r_a);

/// The inverse: the least field that holds the electrons off an anode at `voltage`, T.
double hull_field(double voltage, double r_c, double r_a);
double hull_field_nonrelativistic(double voltage, double r_c, double r_a);

/// Least voltage at which electrons in step with mode n at frequency f (Hz) can reach the anode, V.
/// O. Buneman; D. R. Hartree; see J. C. Slater in G. B. Collins, ed., Microwave Magnetrons (1948) and, relativistic,
/// Y. Y. Lau et al., Phys. Plasmas 17, 033102 (2010). NaN when the wave at r_a would be faster than light.
double hartree_voltage(double field, double r_c, double r_a, int n, double frequency);
double hartree_voltage_nonrelativistic(double field, double r_c, double r_a, int n, double frequency);

/// Voltage of the synchronous velocity at the anode, (m / 2e)(omega r_a / n)^2, V: the least energy an electron in step
/// leaves on the anode, so that 1 - V0 / V bounds the electronic efficiency. Slater, as above.
double synchronous_voltage(double r_a, int n, double frequency);

/// The same voltage relativistic, (gamma - 1) m c^2 / e at the wave's speed: with the field below the corner of the
/// normal form, where the Hartree line touches the Hull curve. NaN when the wave at r_a would be faster than light.
double synchronous_voltage_relativistic(double r_a, int n, double frequency);

/// Field of that corner, 2 m W / (e (1 - r_c^2 / r_a^2)), W = omega / n, T, so that V_BH / V0 = 2 B / B0 - 1 and
/// V_H / V0 = (B / B0)^2: below it no electron can be in step with the wave. J. C. Slater; A. M. Clogston in Collins,
/// as above (from memory). Relativistic: times the gamma of the wave's speed, from the same tangency.
double synchronous_field(double r_c, double r_a, int n, double frequency);
double synchronous_field_relativistic(double r_c, double r_a, int n, double frequency);

/// Bounds of the electronic efficiency at anode voltage V, with V0 of the mode: an electron that lands with the drift
/// energy alone, 1 - V0 / V, and one that lands at the mean of a cycloid, 1 - 2 V0 / V. Slater, as above (from memory).
double drift_efficiency_bound(double voltage, double synchronous);
double cycloid_efficiency_bound(double voltage, double synchronous);

/// gamma of an electron that fell through `voltage`, and its speed, m/s.
double electron_gamma(double voltage);
double electron_speed(double voltage);

/// omega r / c, and the error of static fields in mode n there: a wave J_n(k r) departs from the static r^n by
/// (k r)^2 / (4 (n + 1)) of itself. M. Abramowitz & I. A. Stegun, Handbook of Mathematical Functions, 9.1.10.
double electrical_radius(double r, double frequency);
double static_field_error(double electrical_radius, int n);

/// Anode voltage that holds a Brillouin hub of radius r_b, V; non-relativistic. L. Brillouin, Phys. Rev. 67, 260
/// (1945).
double brillouin_voltage(double field, double r_c, double r_a, double r_b);

/// Radius of the Brillouin hub at `voltage`, m: numerical root of brillouin_voltage, to 1e-14 of the gap.
/// r_a at and above the (non-relativistic) Hull voltage.
double brillouin_hub_radius(double field, double r_c, double r_a, double voltage);

/// Electron density of Brillouin flow at radius r, m^-3, and the hub's charge per axial length up to r_b, C/m
/// (positive).
double brillouin_density(double field, double r_c, double r);
double brillouin_charge_per_length(double field, double r_c, double r_b);

/// Drift of Brillouin flow at radius r, (omega_c / 2)(r - r_c^2 / r), m/s.
double brillouin_speed(double field, double r_c, double r);

/// A Brillouin hub: its edge, the drift there and its charge per axial length (positive).
struct BrillouinHub {
    double radius;             // m
    double edge_speed;         // m/s
    double charge_per_length;  // C/m
};
BrillouinHub brillouin_hub(double field, double r_c, double r_a, double voltage);

/// The same with relativistic electrons, in the applied field alone. Brillouin's two conditions, no canonical angular
/// momentum and no total energy, fix gamma v = (omega_c / 2)(r - r_c^2 / r) and e phi = (gamma - 1) m c^2; with r_b =
/// r_a this is the relativistic Hull voltage. R. C. Davidson, Physics of Nonneutral Plasmas (1990) (from memory;
/// derived).
double brillouin_voltage_relativistic(double field, double r_c, double r_a, double r_b);
BrillouinHub brillouin_hub_relativistic(double field, double r_c, double r_a, double voltage);

/// Langmuir and Blodgett's beta^2 of a cylindrical diode, cathode inside, for r_a / r_c in (1, 1000]: their equation
/// integrated by fourth-order Runge-Kutta, 1e-7 relative. I. Langmuir & K. B. Blodgett, Phys. Rev. 22, 347 (1923).
double langmuir_blodgett_beta_squared(double radius_ratio);

/// Space-charge-limited current per axial length of that diode without magnetic field, A/m; non-relativistic.
double space_charge_limited_current_per_length(double voltage, double r_c, double r_a);

/// The same with relativistic electrons, their own magnetic field left out: Poisson's equation integrated outwards by
/// fourth-order Runge-Kutta, the current found by iteration, 1e-6 relative. Its planar limit is H. Jory & A.
/// Trivelpiece, J. Appl. Phys. 40, 3924 (1969).
double space_charge_limited_current_per_length_relativistic(double voltage, double r_c, double r_a);

/// Planar space-charge-limited current density, A/m^2. C. D. Child (1911); I. Langmuir (1913).
double child_langmuir_current_density(double voltage, double gap);

/// Quality factor of a parallel circuit, omega C / G. S. Y. Liao, Microwave Devices and Circuits, example 10-1-1A.
double quality_factor(double frequency, double capacitance, double conductance);

/// 1 / Q_L = 1 / Q_0 + 1 / Q_ext, and the share of the radio-frequency power that reaches the load, Q_L / Q_ext. Liao.
double loaded_q(double unloaded_q, double external_q);
double circuit_efficiency(double unloaded_q, double external_q);

/// Range of the frequency while a load of this standing-wave ratio goes through all phases, Hz: (f / 2 Q_ext)(s - 1 /
/// s), 0.417 f / Q_ext at 1.5, the pulling figure. G. B. Collins, ed., as above (from memory).
double pulling_figure(double frequency, double external_q, double vswr);

}  // namespace spokewright
