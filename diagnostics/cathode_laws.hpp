// SPDX-License-Identifier: MIT
// What a cathode gives: heat (Richardson-Dushman, lowered after Schottky) and impact (Vaughan). Pure functions, SI
// units but for the energies and the work function, which are in eV as in a deck.
#pragma once

namespace spokewright {

/// Thermionic current density A T^2 exp(-W / kT), A/m^2. O. W. Richardson; S. Dushman, Rev. Mod. Phys. 2, 381 (1930).
/// `pulling_field` (V/m) is the normal field that draws electrons out; it lowers W by sqrt(e E / (4 pi eps0)) volts
/// (W. Schottky, 1914); a holding field (<= 0) changes nothing. Temperature in K, work function in eV.
double thermionic_current_density(double richardson_constant, double temperature, double work_function,
                                  double pulling_field);

/// The surface, as Vaughan's law wants it.
struct SecondarySurface {
    double yield_max;   // at normal incidence
    double energy_max;  // eV, impact energy of that yield
    double roughness;   // k_s, 0 (rough) to 2 (polished)
};

/// Mean number of secondaries of one impact. J. R. M. Vaughan, IEEE Trans. Electron Devices 36, 1963 (1989) and 40, 830
/// (1993). `energy` in eV, `angle` from the normal in rad (0 to pi/2). Zero below 12.5 eV.
double secondary_yield(const SecondarySurface& surface, double energy, double angle);

}  // namespace spokewright
