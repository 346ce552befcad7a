// SPDX-License-Identifier: MIT
#include "diagnostics/summary.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "diagnostics/flat_top.hpp"
#include "diagnostics/ledger.hpp"
#include "diagnostics/theory.hpp"

namespace spokewright {
namespace {

// "None" beside the field-free space-charge-limited current: a smooth bore 3 % beyond Hull cutoff stays below 1 %.
constexpr double kNoCurrentShare = 0.01;
// Spokes show when they beat 5 % and the shot noise of N macro-electrons beyond mid-gap: a random cloud has harmonics
// of about 0.9 / sqrt(N) of its charge, and the strongest of two dozen rarely passes three times that.
constexpr double kSpokeShare = 0.05;
constexpr double kSpokeNoise = 3;
// A ledger that is open by more than this is worth a word; the model's own trial closed to 0.2 %.
constexpr double kImbalanceWarning = 0.01;
// R. Adler's phase (Proc. IRE 34, 351 (1946)) drifts beside the generator's by at least 5 % of his half band wherever
// the generator is 5 % beyond it; a slower drift is a lock, or the end of the way to one.
constexpr double kLockedDrift = 0.05;
// A mode that doubles its energy between neighbouring sixths and is above 1 % of the anode voltage is still starting.
constexpr double kGrowth = 2;
constexpr double kGrowthShare = 0.01;

class Summariser {
public:
    Summariser(const Deck& deck, const Record& record, const RunFacts& facts)
        : deck_(deck),
          record_(record),
          facts_(facts),
          time_ns_(record.column("time_ns")),
          flat_(flat_top(deck, time_ns_)) {}

    Summary run(const WallBooks& books);

private:
    void find_modes();
    void settle();
    void take_means();
    std::vector<double> net_load_power() const;
    void describe_modes();
    void describe_drive();
    void describe_spokes();
    void balance();
    void describe_heat(const WallBook& anode);
    std::string judge_status() const;
    const ModeEntry* growing_mode() const;
    const ModeEntry* too_short_for() const;
    void add_warnings();

    double threshold(const ModeEntry& mode) const {
        return hartree_voltage(mean_field(deck_), deck_.tube.cathode_radius, deck_.tube.anode_radius, mode.number,
                               mode.frequency);
    }
    std::span<const double> averaged(const std::vector<double>& column) const {
        return std::span(column).subspan(s_.averaged_from, s_.averaged_to - s_.averaged_from);
    }
    MeanWithError mean(const char* name) const { return batch_mean(averaged(record_.column(name))); }

    const Deck& deck_;
    const Record& record_;
    const RunFacts& facts_;
    const std::vector<double>& time_ns_;
    FlatTop flat_;
    Settling settling_;
    Summary s_;
};

void Summariser::find_modes() {
    s_.mode_events = watch_modes(deck_, record_, true).events();
    for (const ModeEvent& event : s_.mode_events) {
        const bool within = flat_.last > 0 && event.time_ns <= time_ns_[flat_.last - 1];
        if (within) s_.dominant_mode = event.to;
    }
    s_.pi_mode = s_.dominant_mode > 0 && 2 * s_.dominant_mode == deck_.tube.vane_count;
}

void Summariser::settle() {
    std::size_t last_event = 0;
    for (const ModeEvent& event : s_.mode_events) {
        const auto row = static_cast<std::size_t>(std::lower_bound(time_ns_.begin(), time_ns_.end(), event.time_ns) -
                                                  time_ns_.begin());
        if (event.kind != "mode skip" && row < flat_.last) last_event = row;
    }
    const auto until = [&](const std::vector<double>& column) { return std::span(column).first(flat_.last); };
    std::span<const double> energy;
    if (s_.dominant_mode > 0) energy = until(record_.mode_column(s_.dominant_mode, "energy_J"));
    settling_ = judge_settling(until(record_.column("anode_current_A")), energy, flat_.first, last_event);
    s_.averaged_from = settling_.kept_from;
    s_.averaged_to = std::max(flat_.last, settling_.kept_from);
    if (s_.averaged_from >= s_.averaged_to) return;
    s_.averaged_from_ns = time_ns_[s_.averaged_from];
    s_.averaged_to_ns = time_ns_[s_.averaged_to - 1];
}

void Summariser::take_means() {
    s_.anode_voltage_V = mean("anode_voltage_V");
    s_.anode_current_A = mean("anode_current_A");
    s_.emitted_current_A = mean("emitted_current_A");
    s_.cathode_return_current_A = mean("cathode_return_current_A");
    s_.input_power_W = mean("input_power_W");
    s_.rf_power_W = mean("mode_power_W");
    s_.load_power_W = mean("load_power_W");
    s_.wall_loss_W = mean("wall_loss_W");
    s_.anode_heat_W = mean("anode_heat_W");
    s_.cathode_heat_W = mean("cathode_heat_W");
    s_.hub_radius_mm = mean("hub_radius_mm");
    const auto input = averaged(record_.column("input_power_W"));
    s_.electronic_efficiency = batch_ratio(averaged(record_.column("mode_power_W")), input);
    s_.total_efficiency = batch_ratio(net_load_power(), input);
}

/// What the tube adds to the wave that a generator sends into it, W.
std::vector<double> Summariser::net_load_power() const {
    const auto load = averaged(record_.column("load_power_W"));
    std::vector<double> net(load.begin(), load.end());
    for (std::size_t k = 0; k < net.size(); ++k) {
        const bool driven = time_ns_[s_.averaged_from + k] * 1e-9 > deck_.drive.start;
        if (driven) net[k] -= deck_.drive.power;  // constant over a period
    }
    return net;
}

void Summariser::describe_modes() {
    for (const ModeEntry& mode : deck_.circuit.modes) {
        const auto quantity = [&](const char* name) {
            return batch_mean(averaged(record_.mode_column(mode.number, name)));
        };
        s_.modes.push_back({mode.number, mode.frequency * 1e-9, threshold(mode), quantity("voltage_V"),
                            quantity("backward_V"), quantity("energy_J")});
        const bool pi = 2 * mode.number == deck_.tube.vane_count;
        if (mode.number == s_.dominant_mode || (s_.dominant_mode == 0 && pi)) s_.hartree_voltage_V = threshold(mode);
        if (mode.number != s_.dominant_mode) continue;
        s_.frequency_GHz = quantity("frequency_GHz");
        s_.frequency_shift_MHz = {(s_.frequency_GHz.mean - mode.frequency * 1e-9) * 1e3,
                                  s_.frequency_GHz.half_width * 1e3};
    }
}

void Summariser::describe_drive() {
    if (deck_.drive.power <= 0) return;
    s_.drive_power_W = deck_.drive.power;
    s_.drive_frequency_GHz = deck_.drive.frequency * 1e-9;
    if (s_.dominant_mode != deck_.drive.mode || s_.averaged_from >= s_.averaged_to) return;
    const auto mode = std::ranges::find(deck_.circuit.modes, deck_.drive.mode, &ModeEntry::number);
    const double half_band =
        mode->frequency * 1e-9 / mode->external_q * std::sqrt(deck_.drive.power / s_.load_power_W.mean);
    // The later half of the averaged part: the earlier one may hold the way to the lock.
    const auto frequency = averaged(record_.mode_column(mode->number, "frequency_GHz"));
    const double drift = batch_mean(frequency.last((frequency.size() + 1) / 2)).mean - s_.drive_frequency_GHz;
    s_.locked = std::abs(drift) < kLockedDrift * half_band;
}

void Summariser::describe_spokes() {
    const auto harmonic = [&](int m) { return averaged(record_.column(fmt::format("charge_harmonic_{}_C", m))); };
    double most = 0;
    int strongest = 0;
    for (int m = 1; m <= record_.charge_harmonics(); ++m) {
        double squares = 0;
        for (const double amplitude : harmonic(m)) squares += amplitude * amplitude;
        if (squares <= most) continue;
        most = squares;
        strongest = m;
    }
    if (strongest == 0) return;
    const MeanWithError strength = batch_ratio(harmonic(strongest), harmonic(0));
    const double electrons = mean("charge_harmonic_0_C").mean / (facts_.macro_weight * kElementaryCharge);
    if (!(strength.mean >= std::max(kSpokeShare, kSpokeNoise / std::sqrt(std::abs(electrons))))) return;
    s_.spoke_count = strongest;
    s_.spoke_strength = strength;
}

void Summariser::balance() {
    s_.charge_imbalance_C = charge_imbalance(record_, facts_.macro_weight * kElementaryCharge);
    if (record_.samples() == 0) return;
    s_.energy_imbalance = energy_balance(record_).imbalance();
    if (s_.averaged_to < s_.averaged_from + 2) return;
    const double window = energy_balance(record_, s_.averaged_from, s_.averaged_to - 1).imbalance();
    if (std::isfinite(window)) s_.energy_imbalance = std::max(s_.energy_imbalance, window);
}

void Summariser::describe_heat(const WallBook& anode) {
    const auto vanes = static_cast<std::size_t>(deck_.tube.vane_count);
    if (vanes == 0 || anode.sector_energy.size() != 2 * vanes) return;
    std::int64_t total = 0;
    std::int64_t most = 0;
    for (std::size_t sector = 0; sector < anode.sector_energy.size(); ++sector) {
        total += anode.sector_energy[sector];
        if (sector % 2 == 1 || anode.sector_energy[sector] <= most) continue;  // slots follow their vanes
        most = anode.sector_energy[sector];
        s_.hottest_vane = static_cast<int>(sector / 2);
    }
    if (total > 0) s_.hottest_vane_share = static_cast<double>(most) / static_cast<double>(total);
}

const ModeEntry* Summariser::growing_mode() const {
    const std::size_t sixth = (flat_.last - flat_.first) / 6;
    if (sixth == 0) return nullptr;
    for (const ModeEntry& mode : deck_.circuit.modes) {
        const auto energy = std::span(record_.mode_column(mode.number, "energy_J")).first(flat_.last);
        double late = 0;
        double before = 0;
        for (const double value : energy.last(sixth)) late += value;
        for (const double value : energy.last(2 * sixth).first(sixth)) before += value;
        const double voltage = record_.mode_column(mode.number, "voltage_V")[flat_.last - 1];
        if (late > kGrowth * before && voltage > kGrowthShare * deck_.supply.anode_voltage) return &mode;
    }
    return nullptr;
}

/// A mode that could not have lasted its dwell twice within the flat top: too early to call it skipped.
const ModeEntry* Summariser::too_short_for() const {
    const double watched_ns = time_ns_[flat_.last - 1] - time_ns_[flat_.first];
    for (const ModeEntry& mode : deck_.circuit.modes) {
        if (watched_ns * 1e-9 * mode.frequency < 2 * kDwellPeriods) return &mode;
    }
    return nullptr;
}

std::string Summariser::judge_status() const {
    if (flat_.first >= flat_.last) return "not settled";
    if (s_.dominant_mode > 0) return settling_.settled ? "settled" : "not settled";
    const double voltage = deck_.supply.anode_voltage;
    bool hopeless = voltage < s_.hull_voltage_V;
    for (const ModeEntry& mode : deck_.circuit.modes) hopeless = hopeless && voltage < threshold(mode);
    const double free_current =
        deck_.tube.axial_height *
        space_charge_limited_current_per_length(voltage, deck_.tube.cathode_radius, deck_.tube.anode_radius);
    if (hopeless && std::abs(s_.anode_current_A.mean) < kNoCurrentShare * free_current) return "cut off";
    if (deck_.circuit.modes.empty()) return settling_.settled ? "settled" : "not settled";
    if (!facts_.early_end.empty()) return "no oscillation";  // the stop rule has looked closer
    const bool too_early = facts_.interrupted || growing_mode() != nullptr || too_short_for() != nullptr;
    return too_early ? "not settled" : "no oscillation";
}

void Summariser::add_warnings() {
    s_.warnings = facts_.warnings;
    if (facts_.interrupted) {
        s_.warnings.push_back(fmt::format("stopped at {:.1f} of {:.1f} ns; continue with --resume", s_.end_time_ns,
                                          deck_.clock.end_time * 1e9));
    }
    if (s_.status == "not settled" && !settling_.reason.empty())
        s_.warnings.push_back("not settled: " + settling_.reason);
    if (s_.dominant_mode == 0 && flat_.first < flat_.last) {
        const ModeEntry* short_for = too_short_for();
        const ModeEntry* growing = growing_mode();
        if (s_.status == "not settled" && short_for != nullptr) {
            s_.warnings.push_back(fmt::format(
                "the flat top is shorter than {:.0f} periods of mode {}, too short to see a mode start: lengthen "
                "clock.end_time_ns",
                2 * kDwellPeriods, short_for->number));
        } else if (growing != nullptr) {
            s_.warnings.push_back(fmt::format("mode {} is still growing: lengthen clock.end_time_ns", growing->number));
        }
    }
    if (std::isfinite(s_.energy_imbalance) && s_.energy_imbalance > kImbalanceWarning) {
        s_.warnings.push_back(
            fmt::format("the energy ledger is open by {:.2g} %: lower clock.step_ps or raise "
                        "electrons.target_count",
                        100 * s_.energy_imbalance));
    }
    if (s_.charge_imbalance_C > 0) {
        s_.warnings.push_back("the charge books disagree: this is a fault of the program, please report it");
    }
}

Summary Summariser::run(const WallBooks& books) {
    s_.version = facts_.version;
    s_.deck_sha256 = deck_.sha256;
    s_.seed = deck_.electrons.seed;
    s_.early_end = facts_.early_end;
    s_.end_time_ns = time_ns_.empty() ? 0 : time_ns_.back();
    s_.hull_voltage_V = hull_voltage(mean_field(deck_), deck_.tube.cathode_radius, deck_.tube.anode_radius);
    s_.electrons = time_ns_.empty() ? 0 : record_.last("electrons");
    s_.steps = facts_.steps;
    s_.wall_clock_s = facts_.wall_clock;
    s_.ns_per_electron_step = facts_.ns_per_electron_step;
    find_modes();
    settle();
    take_means();
    describe_modes();
    describe_drive();
    describe_spokes();
    balance();
    describe_heat(books.anode);
    s_.status = judge_status();
    if (s_.status == "settled") s_.settled_from_ns = s_.averaged_from_ns;
    add_warnings();
    return std::move(s_);
}

}  // namespace

Summary summarise(const Deck& deck, const Record& record, const WallBooks& books, const RunFacts& facts) {
    return Summariser(deck, record, facts).run(books);
}

}  // namespace spokewright
