// SPDX-License-Identifier: MIT
#include "diagnostics/cathode_laws.hpp"

#include <algorithm>
#include <cmath>

#include "inputs/constants.hpp"

namespace spokewright {

double thermionic_current_density(double richardson_constant, double temperature, double work_function,
                                  double pulling_field) {
    if (temperature <= 0) return 0;
    const double pull = std::max(pulling_field, 0.0);
    const double lowering = std::sqrt(kElementaryCharge * pull / (4 * kPi * kVacuumPermittivity));  // V
    const double exponent = -(work_function - lowering) * kElementaryCharge / (kBoltzmann * temperature);
    return richardson_constant * temperature * temperature * std::exp(exponent);
}

double secondary_yield(const SecondarySurface& surface, double energy, double angle) {
    constexpr double kThreshold = 12.5;  // eV, Vaughan 1989
    if (energy <= kThreshold) return 0;
    const double growth = 1 + surface.roughness * angle * angle / (2 * kPi);
    const double yield_max = surface.yield_max * growth;
    const double v = (energy - kThreshold) / (surface.energy_max * growth - kThreshold);
    if (v > 3.6) return yield_max * 1.125 * std::pow(v, -0.35);  // Vaughan 1993, joins the curve at 3.6
    const double k = v < 1 ? 0.56 : 0.25;
    // (v exp(1 - v))^k, in single precision: it is drawn for every electron that returns, and no surface is known to
    // 1e-6
    const float u = static_cast<float>(v);
    return yield_max * static_cast<double>(std::exp(static_cast<float>(k) * (1 - u + std::log(u))));
}

}  // namespace spokewright
