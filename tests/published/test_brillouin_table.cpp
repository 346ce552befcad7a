// SPDX-License-Identifier: MIT
// Source: L. Brillouin, Phys. Rev. 67, 260 (1945); values computed from it. Relativistic: R. C. Davidson, Physics of
// Nonneutral Plasmas (1990) (from memory); its radial balance of forces is checked here.
#include <doctest/doctest.h>

#include <cmath>
#include <string>

#include "diagnostics/theory.hpp"
#include "inputs/constants.hpp"
#include "tests/published_row.hpp"

using namespace spokewright;

namespace {
const std::string kSource = "L. Brillouin, Phys. Rev. 67, 260 (1945), computed";
const std::string kDavidson = "R. C. Davidson, Physics of Nonneutral Plasmas (1990) (from memory)";
constexpr double kCathode = 1.95e-3, kAnode = 4.45e-3, kField = 0.18, kVoltage = 4000;
}  // namespace

TEST_CASE("Brillouin hub of 4 kV at 0.18 T, 1.95/4.45 mm") {
    const BrillouinHub hub = brillouin_hub(kField, kCathode, kAnode, kVoltage);
    const auto row = [](const char* check, double published, double ours, double tolerance) {
        check_published({check, kSource, published, ours, tolerance, "half a unit of the last figure given"});
    };
    row("Brillouin hub radius, m", 2.51492e-3, hub.radius, 2e-6);
    row("Brillouin drift at the hub's edge, m/s", 1.5876e7, hub.edge_speed, 3.2e-5);
    row("Brillouin density at the cathode, m^-3", 3.14923e17, brillouin_density(kField, kCathode, kCathode), 2e-6);
    row("Brillouin density at the hub's edge, m^-3", 2.14375e17, brillouin_density(kField, kCathode, hub.radius), 3e-6);
    row("charge of the Brillouin hub, C/m", 3.20098e-7, hub.charge_per_length, 2e-6);
    check_published(
        {"anode voltage of a Brillouin hub that fills the gap over the Hull voltage",
         "L. Brillouin, Phys. Rev. 67, 260 (1945); A. W. Hull, Phys. Rev. 18, 31 (1921)", 1,
         brillouin_voltage(kField, kCathode, kAnode, kAnode) / hull_voltage_nonrelativistic(kField, kCathode, kAnode),
         1e-12, "an identity, to rounding"});
}

TEST_CASE("relativistic hub: fills the gap at the relativistic Hull voltage, and forces balance in it") {
    const double field = 0.72, r_c = 15.8e-3, r_a = 21.1e-3;
    check_published({"anode voltage of a relativistic hub that fills the gap over the Hull voltage, 15.8/21.1 mm",
                     "R. V. Lovelace & E. Ott, Phys. Fluids 17, 1263 (1974) (from memory)", 1,
                     brillouin_voltage_relativistic(field, r_c, r_a, r_a) / hull_voltage(field, r_c, r_a), 1e-12,
                     "an identity, to rounding"});
    const BrillouinHub hub = brillouin_hub_relativistic(field, r_c, r_a, 350e3);
    const double speed = hub.edge_speed;
    const double gamma = 1 / std::sqrt(1 - std::pow(speed / kLightSpeed, 2));
    const double electric = hub.charge_per_length / (2 * kPi * kVacuumPermittivity * hub.radius);  // V/m, by Gauss
    const double centripetal = gamma * kElectronMass * speed * speed / hub.radius;
    check_published({"relativistic hub, 350 kV: centripetal force at the edge over e (v B - E)", kDavidson, 1,
                     centripetal / (kElementaryCharge * (speed * field - electric)), 1e-9,
                     "an identity; two forces cancel to a hundredth"});
}
