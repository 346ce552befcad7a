// SPDX-License-Identifier: MIT
// Source: J. P. Boris (1970), second order in the step (C. K. Birdsall & A. B. Langdon, Plasma Physics via Computer
// Simulation (1985), ch. 4); reference: Boost.Odeint's Runge-Kutta-Fehlberg 7(8) to 1e-12 in the same crossed field.
#include <doctest/doctest.h>
#include <fmt/format.h>

#include <boost/numeric/odeint.hpp>
#include <cmath>
#include <stdexcept>
#include <vector>

#include "pic/push.hpp"
#include "tests/fitted_order.hpp"
#include "tests/published_row.hpp"

using namespace spokewright;

namespace {

using Orbit = std::vector<double>;  // x, y (m), u_x, u_y (gamma v, m/s)

/// A field that rises with radius and angle, as between spokes. The potential is linear in the square of the radius and
/// in the angle, so that the table holds it without jumps from cell to cell and the step is all that is measured. It
/// jumps at theta = 0: the orbits keep away from there.
struct CrossedField {
    PolarGrid grid;
    double voltage;   // V, across the gap at theta = pi
    double magnetic;  // T, at the cathode; 1.5 times that at the anode

    std::vector<double> potential() const {
        std::vector<double> values;
        for (int i = 0; i <= grid.n_r; ++i) {
            const double share = area_share(grid.radius(i));
            for (int j = 0; j < grid.n_theta; ++j) {
                const double turns = grid.theta(j) / (2 * kPi);
                values.push_back(voltage * share * (0.7 + 0.6 * turns) + 0.3 * voltage * turns);
            }
        }
        return values;
    }
    std::vector<double> rows() const {
        std::vector<double> values;
        for (int i = 0; i <= grid.n_r; ++i) {
            values.push_back(magnetic * (1 + 0.5 * i / grid.n_r));
        }
        return values;
    }
    double area_share(double r) const {
        const double r_c2 = grid.cathode_radius * grid.cathode_radius;
        return (r * r - r_c2) / (grid.anode_radius * grid.anode_radius - r_c2);
    }
};

/// The table's field in double precision, as the orbit's right-hand side.
class TableField {
public:
    TableField(const CrossedField& field, double dt) : units_{field.grid, dt}, force_(units_) {
        force_.update(field.potential(), SurfaceField(field.grid), field.rows());
    }
    const ForceTable& force() const { return force_; }
    const StepUnits& units() const { return units_; }

    void operator()(const Orbit& orbit, Orbit& rate, double) const {
        const double r = std::hypot(orbit[0], orbit[1]);
        const double cells = r / units_.grid.dr() - units_.cathode_cells();
        const double angle = std::atan2(orbit[1], orbit[0]);
        const double azimuth = (angle < 0 ? angle + 2 * kPi : angle) / units_.grid.dtheta();
        if (!(cells >= 0 && cells < units_.grid.n_r)) throw std::range_error("the orbit left the gap");
        const auto i = static_cast<std::size_t>(cells), j = static_cast<std::size_t>(azimuth);
        const double fraction = cells - std::floor(cells), t = azimuth - std::floor(azimuth);
        const CellForce& cell = force_.cells()[i * units_.cell_stride() + j];
        const double s = fraction + static_cast<double>(cell.bend) * fraction * (fraction - 1);
        const double to_acceleration = 2 * units_.speed() / units_.dt;  // from half a step's kick
        const double a_r = to_acceleration * (1 + static_cast<double>(cell.slope) * (fraction - 0.5)) *
                           (static_cast<double>(cell.radial) + static_cast<double>(cell.radial_rise) * t);
        const double a_theta =
            to_acceleration * (static_cast<double>(cell.along) + static_cast<double>(cell.along_rise) * s);
        const double half_turn = static_cast<double>(cell.turn) + static_cast<double>(cell.turn_rise) * s;
        const double gamma = std::sqrt(1 + (orbit[2] * orbit[2] + orbit[3] * orbit[3]) / (kLightSpeed * kLightSpeed));
        const double turn = 2 * half_turn / units_.dt / gamma;  // rad/s; negative: q = -e
        const double cosine = orbit[0] / r, sine = orbit[1] / r;
        rate = {orbit[2] / gamma, orbit[3] / gamma, a_r * cosine - a_theta * sine + turn * orbit[3],
                a_r * sine + a_theta * cosine - turn * orbit[2]};
    }

private:
    StepUnits units_;
    ForceTable force_;
};

Orbit integrate(const TableField& field, Orbit orbit, double time) {
    using Stepper = boost::numeric::odeint::runge_kutta_fehlberg78<Orbit>;
    const auto controlled = boost::numeric::odeint::make_controlled<Stepper>(1e-18, 1e-12);
    boost::numeric::odeint::integrate_adaptive(controlled, std::cref(field), orbit, 0.0, time, time / 1000);
    return orbit;
}

struct Miss {
    double radius, phase;  // root mean square over the orbits: share of the gap, rad
};

/// Orbits from rest to `speed` (gamma v, m/s) at the start, all within the gap, after `steps` steps of time / steps.
Miss miss(const CrossedField& field, double time, int steps, double speed) {
    const double dt = time / steps;
    const TableField table(field, dt);
    const StepUnits& units = table.units();
    ElectronStore store;
    std::vector<Orbit> ends;
    for (int k = 0; k < 8; ++k) {
        const double radius =
            field.grid.radius(0) + (0.3 + 0.04 * k) * (field.grid.anode_radius - field.grid.radius(0));
        const double theta = 0.5 + 0.1 * k, u = speed * k / 8;
        const Orbit start{radius * std::cos(theta), radius * std::sin(theta), -u * std::sin(theta),
                          u * std::cos(theta)};
        ends.push_back(integrate(table, start, time));
        const Orbit half = integrate(table, start, -0.5 * dt);
        const double place = (radius - field.grid.radius(0)) / field.grid.dr();
        store.append({static_cast<std::int32_t>(std::lrint(place * kRadialOne)),
                      static_cast<std::int32_t>(std::lrint(theta / field.grid.dtheta() * kAzimuthalOne)),
                      static_cast<float>((half[2] * std::cos(theta) + half[3] * std::sin(theta)) / units.speed()),
                      static_cast<float>((half[3] * std::cos(theta) - half[2] * std::sin(theta)) / units.speed())});
    }
    Push push(units, 1);
    for (int k = 0; k < steps; ++k) {
        push.advance(store, table.force());
        REQUIRE(push.hits().empty());
    }
    Miss sum{0, 0};
    for (std::size_t k = 0; k < ends.size(); ++k) {
        const double cells = std::hypot(ends[k][0], ends[k][1]) / field.grid.dr() - units.cathode_cells();
        const double radius = (store.r[k] * (1.0 / kRadialOne) - cells) / field.grid.n_r;
        const double angle = std::atan2(ends[k][1], ends[k][0]);
        const double theta = store.theta[k] * (field.grid.dtheta() / kAzimuthalOne);
        const double phase = std::remainder(theta - angle, 2 * kPi);
        sum.radius += radius * radius;
        sum.phase += phase * phase;
    }
    const auto count = static_cast<double>(ends.size());
    return {std::sqrt(sum.radius / count), std::sqrt(sum.phase / count)};
}

void check_second_order(const CrossedField& field, double time, double speed, std::initializer_list<int> steps) {
    std::vector<double> dt, radius, phase;
    for (const int count : steps) {
        const Miss found = miss(field, time, count, speed);
        dt.push_back(time / count);
        radius.push_back(found.radius);
        phase.push_back(found.phase);
        MESSAGE(count << " steps: radius " << found.radius << " of the gap, phase " << found.phase << " rad");
    }
    // Single-precision momenta: their rounding, some 1e-6 of the gap at the end, is below a hundredth of every error.
    const auto check = [&](const char* what, const std::vector<double>& errors) {
        check_published({fmt::format("order of the push in the step, {}, {:.0f} kV", what, 1e-3 * field.voltage),
                         "J. P. Boris (1970); reference Runge-Kutta-Fehlberg 7(8)", 2, fitted_order(dt, errors), 0.05,
                         "three steps; the next order is a few per cent of the error"});
    };
    check("radius", radius);
    check("phase", phase);
}

}  // namespace

TEST_CASE("Boris push: radius and phase second order in the step, 4 kV") {
    // Some five gyrations at 0.18 T.
    check_second_order({{1.95e-3, 4.45e-3, 9.5e-3, 120, 160}, 4e3, 0.18}, 1e-9, 2e7, {300, 600, 1200});
}

TEST_CASE("Boris push: radius and phase second order in the step, relativistic, 350 kV") {
    check_second_order({{1.58e-2, 2.11e-2, 20e-3, 120, 160}, 350e3, 0.72}, 4e-10, 2e8, {300, 600, 1200});
}
