// SPDX-License-Identifier: MIT
#include "fields/supply.hpp"

#include <algorithm>
#include <cmath>

namespace spokewright {

Supply::Supply(const SupplySettings& settings, double tube_capacitance, double dt)
    : settings_(settings),
      capacitance_(settings.shunt_capacitance + tube_capacitance),
      dt_(dt),
      voltage_(settings.regulated_current > 0 ? 0 : programme_voltage(0)) {}

double Supply::programme_voltage(double time) const {
    const auto& points = settings_.programme;
    const auto next =
        std::find_if(points.begin(), points.end(), [&](const ProgrammePoint& p) { return p.time > time; });
    double share = 0;
    if (next == points.begin()) {
        share = points.front().share;
    } else if (next == points.end()) {
        share = points.back().share;
    } else {
        const ProgrammePoint& before = *(next - 1);
        share = before.share + (next->share - before.share) * (time - before.time) / (next->time - before.time);
    }
    return settings_.anode_voltage * share;
}

double Supply::advance(double time, double induced) {
    const double before = voltage_;
    if (settings_.regulated_current > 0) {
        const double free = before + (settings_.regulated_current * dt_ - induced) / capacitance_;
        voltage_ = std::clamp(free, 0.0, std::max(0.0, programme_voltage(time)));
    } else if (settings_.series_resistance > 0) {
        // Exact for a current that is constant within the step, also when R C is far below a step.
        const double middle = 0.5 * (programme_voltage(time) + programme_voltage(time - dt_));
        const double settled = middle - settings_.series_resistance * induced / dt_;
        voltage_ = settled + (before - settled) * std::exp(-dt_ / (settings_.series_resistance * capacitance_));
    } else {
        voltage_ = programme_voltage(time);
    }
    return 0.5 * (before + voltage_) * induced;
}

}  // namespace spokewright
