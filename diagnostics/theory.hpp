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

/// Langmuir and Blodgett's beta^2 of a cylindrical diode, cathode inside, for r_a / r_c in (1, 1000]: their equation
/// integrated by fourth-order Runge-Kutta, 1e-7 relative. I. Langmuir & K. B. Blodgett, Phys. Rev. 22, 347 (1923).
double langmuir_blodgett_beta_squared(double radius_ratio);

/// Space-charge-limited current per axial length of that diode without magnetic field, A/m; non-relativistic.
double space_charge_limited_current_per_length(double voltage, double r_c, double r_a);

/// Planar space-charge-limited current density, A/m^2. C. D. Child (1911); I. Langmuir (1913).
double child_langmuir_current_density(double voltage, double gap);

}  // namespace spokewright
