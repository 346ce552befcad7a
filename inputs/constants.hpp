// SPDX-License-Identifier: MIT
// Physical constants in SI units, CODATA 2018 (E. Tiesinga et al., Rev. Mod. Phys. 93, 025010 (2021)).
#pragma once

#include <numbers>

namespace spokewright {

inline constexpr double kElementaryCharge = 1.602176634e-19;     // C, exact
inline constexpr double kElectronMass = 9.1093837015e-31;        // kg
inline constexpr double kLightSpeed = 299792458.0;               // m/s, exact
inline constexpr double kVacuumPermittivity = 8.8541878128e-12;  // F/m
inline constexpr double kVacuumPermeability = 1.25663706212e-6;  // H/m
inline constexpr double kBoltzmann = 1.380649e-23;               // J/K, exact
inline constexpr double kPi = std::numbers::pi;

}  // namespace spokewright
