// SPDX-License-Identifier: MIT
#include "diagnostics/mode_watch.hpp"

#include <algorithm>

namespace spokewright {

ModeWatch::ModeWatch(const Deck& deck)
    : modes_(deck.circuit.modes), threshold_(kOscillationShare * deck.supply.anode_voltage) {}

double ModeWatch::period_ns(int mode) const {
    const auto entry = std::find_if(modes_.begin(), modes_.end(),
                                    [&](const ModeEntry& candidate) { return candidate.number == mode; });
    return entry == modes_.end() ? 0 : 1e9 / entry->frequency;
}

void ModeWatch::observe(double time_ns, std::span<const double> voltages, std::span<const double> energies) {
    int strongest = 0;
    double most = 0;
    for (std::size_t k = 0; k < modes_.size(); ++k) {
        if (voltages[k] <= threshold_ || energies[k] <= most) continue;
        strongest = modes_[k].number;
        most = energies[k];
    }
    if (strongest != challenger_) {
        challenger_ = strongest;
        since_ns_ = time_ns;
    }
    if (challenger_ == leading_) return;
    const double dwell = kDwellPeriods * period_ns(challenger_ != 0 ? challenger_ : leading_);
    if (time_ns - since_ns_ < dwell) return;
    const char* kind = leading_ == 0 ? "mode start" : challenger_ == 0 ? "mode loss" : "mode shift";
    events_.push_back({since_ns_, kind, leading_, challenger_});
    leading_ = challenger_;
}

void ModeWatch::finish(double time_ns) {
    if (!modes_.empty() && events_.empty()) events_.push_back({time_ns, "mode skip", 0, 0});
}

ModeWatch watch_modes(const Deck& deck, const Record& record, bool finished) {
    ModeWatch watch(deck);
    std::vector<const std::vector<double>*> voltage_columns, energy_columns;
    for (const ModeEntry& mode : deck.circuit.modes) {
        voltage_columns.push_back(&record.mode_column(mode.number, "voltage_V"));
        energy_columns.push_back(&record.mode_column(mode.number, "energy_J"));
    }
    std::vector<double> voltages(voltage_columns.size()), energies(energy_columns.size());
    const auto& time_ns = record.column("time_ns");
    for (std::size_t row = 0; row < time_ns.size(); ++row) {
        for (std::size_t k = 0; k < voltages.size(); ++k) {
            voltages[k] = (*voltage_columns[k])[row];
            energies[k] = (*energy_columns[k])[row];
        }
        watch.observe(time_ns[row], voltages, energies);
    }
    if (finished && !time_ns.empty()) watch.finish(time_ns.back());
    return watch;
}

}  // namespace spokewright
