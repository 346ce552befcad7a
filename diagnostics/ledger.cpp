// SPDX-License-Identifier: MIT
#include "diagnostics/ledger.hpp"

#include <cmath>
#include <limits>

namespace spokewright {
namespace {

/// Everything since the start at one row, with an empty tube as the zero of what is stored.
EnergyBalance balance_at(const Record& record, std::size_t row) {
    const auto at = [&](const char* name) { return record.column(name).at(row); };
    EnergyBalance balance;
    balance.in = at("supply_energy_J") + at("prime_energy_J") + at("drive_energy_J") + at("emission_energy_J");
    balance.out = at("wall_loss_J") + at("load_energy_J") + at("anode_energy_J") + at("cathode_energy_J");
    balance.stored_change = at("kinetic_energy_J") + at("space_charge_energy_J") + at("resonator_energy_J");
    return balance;
}

}  // namespace

double EnergyBalance::imbalance() const {
    const double missing = std::abs(in - out - stored_change);
    if (missing == 0) return 0;
    return in > 0 ? missing / in : std::numeric_limits<double>::infinity();
}

EnergyBalance energy_balance(const Record& record, std::size_t first, std::size_t last) {
    const EnergyBalance before = balance_at(record, first);
    const EnergyBalance after = balance_at(record, last);
    return {after.in - before.in, after.out - before.out, after.stored_change - before.stored_change};
}

EnergyBalance energy_balance(const Record& record) {
    return record.samples() == 0 ? EnergyBalance{} : balance_at(record, record.samples() - 1);
}

double charge_imbalance(const Record& record, double macro_charge) {
    return record.totals().charge_mismatch * std::abs(macro_charge);
}

}  // namespace spokewright
