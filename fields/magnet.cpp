// SPDX-License-Identifier: MIT
#include "fields/magnet.hpp"

#include <algorithm>
#include <cmath>

#include "inputs/constants.hpp"

namespace spokewright {
namespace {

// Linear interpolation; the reader has checked that the table covers the interaction space.
double table_field(const std::vector<FieldSample>& table, double radius) {
    auto next = std::find_if(table.begin(), table.end(), [&](const FieldSample& s) { return s.radius >= radius; });
    if (next == table.begin()) {
        return table.front().field;
    }
    if (next == table.end()) {
        return table.back().field;
    }
    const FieldSample& before = *(next - 1);
    return before.field + (next->field - before.field) * (radius - before.radius) / (next->radius - before.radius);
}

}  // namespace

Magnet::Magnet(const MagnetSettings& settings, const PolarGrid& grid)
    : self_(static_cast<std::size_t>(grid.n_r) + 1, 0.0) {
    for (int i = 0; i <= grid.n_r; ++i) {
        const double field = settings.table.empty() ? settings.field : table_field(settings.table, grid.radius(i));
        applied_.push_back(field * settings.field_scale);
    }
    total_ = applied_;
}

void Magnet::set_self_field(std::span<const double> row_current) {
    // Half of a row's own current lies outside of it.
    double outside = 0;
    for (std::size_t i = self_.size(); i-- > 0;) {
        self_[i] = kVacuumPermeability * (outside + 0.5 * row_current[i]);
        outside += row_current[i];
        total_[i] = applied_[i] + self_[i];
    }
}

void Magnet::restore_self_field(std::span<const double> self) {
    self_.assign(self.begin(), self.end());
    for (std::size_t i = 0; i < total_.size(); ++i) {
        total_[i] = applied_[i] + self_[i];
    }
}

double Magnet::self_field_share() const {
    double share = 0;
    for (std::size_t i = 0; i < self_.size(); ++i) {
        share = std::max(share, applied_[i] == 0 ? 0 : std::abs(self_[i] / applied_[i]));
    }
    return share;
}

}  // namespace spokewright
