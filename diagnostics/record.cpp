// SPDX-License-Identifier: MIT
#include "diagnostics/record.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <bit>
#include <cmath>
#include <limits>
#include <stdexcept>

#include "inputs/errors.hpp"

namespace spokewright {
namespace {

constexpr std::size_t kTotalsLength = sizeof(RunningTotals) / sizeof(double);
using PlainTotals = std::array<double, kTotalsLength>;  // RunningTotals holds nothing but doubles
constexpr int kSmoothBoreHarmonics = 16;

using Columns = std::vector<Column>;

void add_interval_columns(Columns& columns) {
    const auto add = [&](const char* name, const char* unit, const char* text) {
        columns.push_back({name, unit, text, {}});
    };
    add("time_ns", "ns", "tube time of the sample");
    add("anode_voltage_V", "V", "anode voltage at the sample");
    add("anode_current_A", "A", "current induced in the anode by the electrons, mean since the last sample");
    add("emitted_current_A", "A",
        "electrons leaving the cathode, primaries and secondaries, mean since the last sample");
    add("secondary_current_A", "A", "secondaries leaving the cathode, mean since the last sample");
    add("cathode_return_current_A", "A", "electrons returning to the cathode, mean since the last sample");
    add("anode_hit_current_A", "A", "electrons landing on the anode, mean since the last sample");
    add("input_power_W", "W", "from the supply to the electrons, mean since the last sample");
    add("mode_power_W", "W", "from the electrons to the resonators, mean since the last sample");
    add("wall_loss_W", "W", "lost in the resonators' walls, mean since the last sample");
    add("load_power_W", "W", "out to the load, a generator's reflected wave included, mean since the last sample");
    add("anode_heat_W", "W", "kinetic energy left on the anode, mean since the last sample");
    add("cathode_heat_W", "W", "kinetic energy left on the cathode (back bombardment), mean since the last sample");
    add("electrons", "1", "macro-electrons in flight");
    add("hub_radius_mm", "mm", "outermost radius at which the azimuthally averaged density is half of its peak");
}

void add_mode_columns(Columns& columns, int n) {
    const auto add = [&](const char* quantity, const char* unit, const char* text) {
        columns.push_back({fmt::format("mode_{}_{}", n, quantity), unit, fmt::format("mode {}: {}", n, text), {}});
    };
    add("voltage_V", "V", "vane voltage amplitude of the wave that turns with the electrons");
    add("backward_V", "V", "vane voltage amplitude of the wave that turns against the electrons");
    add("energy_J", "J", "energy stored in its resonators");
    add("frequency_GHz", "GHz", "phase advance of the forward wave since the last sample, next to the cold frequency");
    add("re_V", "V", "real part of the forward wave's complex amplitude (turning at the mode's frequency)");
    add("im_V", "V", "imaginary part of the forward wave's complex amplitude");
}

void add_ledger_columns(Columns& columns) {
    const auto add = [&](const char* name, const char* unit, const char* text) {
        columns.push_back({name, unit, text, {}});
    };
    add("supply_energy_J", "J", "delivered by the supply to the electrons since the start");
    add("prime_energy_J", "J", "put into the resonators by priming since the start");
    add("drive_energy_J", "J", "brought by the incident wave of a generator since the start");
    add("emission_energy_J", "J", "kinetic energy of all emitted electrons since the start");
    add("wall_loss_J", "J", "lost in the resonators' walls since the start");
    add("load_energy_J", "J", "delivered to the load since the start");
    add("anode_energy_J", "J", "kinetic energy left on the anode since the start");
    add("cathode_energy_J", "J", "kinetic energy left on the cathode since the start");
    add("kinetic_energy_J", "J", "kinetic energy of the electrons in flight");
    add("space_charge_energy_J", "J", "field energy of the space charge");
    add("resonator_energy_J", "J", "energy stored in all resonators");
    add("self_field_percent", "%", "largest field of the electrons' own current over the applied field");
}

/// Frequency (Hz) from two complex amplitudes `interval` apart, on the branch next to `cold`. NaN without an amplitude.
double branch_frequency(std::complex<double> before, std::complex<double> after, double interval, double cold) {
    if (!(interval > 0) || std::abs(before) == 0 || std::abs(after) == 0) {
        return std::numeric_limits<double>::quiet_NaN();
    }
    const double expected = 2 * kPi * cold * interval;
    const double shift = std::remainder(std::arg(after * std::conj(before)) - expected, 2 * kPi);
    return cold + shift / (2 * kPi * interval);
}

}  // namespace

double hub_radius(const PolarGrid& grid, std::span<const double> node_charge) {
    std::vector<double> density(static_cast<std::size_t>(grid.n_r) + 1);
    for (int i = 0; i <= grid.n_r; ++i) {
        double charge = 0;
        for (int j = 0; j < grid.n_theta; ++j) charge += node_charge[grid.node(i, j)];
        density[static_cast<std::size_t>(i)] = std::abs(charge) / grid.node_volume(i);
    }
    const double half = 0.5 * *std::max_element(density.begin(), density.end());
    if (half <= 0) return grid.cathode_radius;
    for (int i = grid.n_r; i >= 0; --i) {
        const double inner = density[static_cast<std::size_t>(i)];
        if (inner < half) continue;
        if (i == grid.n_r) return grid.anode_radius;
        const double outer = density[static_cast<std::size_t>(i) + 1];
        return grid.radius(i) + grid.dr() * (inner - half) / (inner - outer);
    }
    return grid.cathode_radius;
}

Record::Record(const Deck& deck)
    : harmonics_(std::min(deck.tube.vane_count > 0 ? deck.tube.vane_count : kSmoothBoreHarmonics,
                          deck.grid.azimuthal_cells / 2)),
      fourier_(1, deck.grid.azimuthal_cells),
      ring_(static_cast<std::size_t>(deck.grid.azimuthal_cells)),
      spectrum_(static_cast<std::size_t>(fourier_.harmonics())) {
    add_interval_columns(columns_);
    for (const ModeEntry& mode : deck.circuit.modes) {
        mode_numbers_.push_back(mode.number);
        add_mode_columns(columns_, mode.number);
    }
    for (int m = 0; m <= harmonics_; ++m) {
        columns_.push_back(
            {fmt::format("charge_harmonic_{}_C", m),
             "C",
             fmt::format("azimuthal harmonic {} of the charge beyond mid-gap, |sum q exp(-j m theta)|", m),
             {}});
    }
    add_ledger_columns(columns_);
}

void Record::add(const Tally& tally) {
    totals_.time += tally.dt;
    totals_.induced_charge += tally.induced_charge;
    totals_.primaries += static_cast<double>(tally.primaries);
    totals_.secondaries += static_cast<double>(tally.secondaries);
    totals_.anode_hits += static_cast<double>(tally.anode_hits);
    totals_.cathode_hits += static_cast<double>(tally.cathode_hits);
    totals_.supply_energy += tally.supply_energy;
    totals_.prime_energy += tally.prime_energy;
    totals_.drive_energy += tally.drive_energy;
    totals_.mode_energy += tally.mode_energy;
    totals_.wall_loss += tally.wall_loss;
    totals_.load_energy += tally.load_energy;
    totals_.emission_energy += tally.emission_energy;
    totals_.anode_energy += tally.anode_energy;
    totals_.cathode_energy += tally.cathode_energy;
    totals_.electron_steps += static_cast<double>(tally.electrons);
    totals_.anode_voltage = tally.anode_voltage;
}

void Record::sample(const SpaceView& view) {
    if (view.modes.size() != mode_numbers_.size()) {
        throw std::logic_error(
            fmt::format("record: a sample brings {} modes, the deck has {}", view.modes.size(), mode_numbers_.size()));
    }
    cursor_ = 0;
    append_interval(view);
    for (const ModeState& mode : view.modes) append_mode(mode, totals_.time - mark_.time);
    append_charge(view);
    append_ledger(view);

    const double in_flight = totals_.primaries + totals_.secondaries - totals_.anode_hits - totals_.cathode_hits;
    const double scattered = static_cast<double>(view.scattered_electrons);
    const double stored = static_cast<double>(view.electrons);
    totals_.charge_mismatch =
        std::max({totals_.charge_mismatch, std::abs(in_flight - scattered), std::abs(in_flight - stored)});
    mark_ = totals_;
}

void Record::append_interval(const SpaceView& view) {
    const double interval = totals_.time - mark_.time;
    const auto rate = [&](double RunningTotals::*sum) {
        return interval > 0 ? (totals_.*sum - mark_.*sum) / interval : 0.0;
    };
    const double charge = std::abs(view.macro_charge);
    const double secondary_current = charge * rate(&RunningTotals::secondaries);
    push(view.time * 1e9);
    push(totals_.anode_voltage);
    push(rate(&RunningTotals::induced_charge));
    push(charge * rate(&RunningTotals::primaries) + secondary_current);
    push(secondary_current);
    push(charge * rate(&RunningTotals::cathode_hits));
    push(charge * rate(&RunningTotals::anode_hits));
    push(rate(&RunningTotals::supply_energy));
    push(rate(&RunningTotals::mode_energy));
    push(rate(&RunningTotals::wall_loss));
    push(rate(&RunningTotals::load_energy));
    push(rate(&RunningTotals::anode_energy));
    push(rate(&RunningTotals::cathode_energy));
    push(static_cast<double>(view.electrons));
    push(hub_radius(view.grid, view.node_charge) * 1e3);
}

void Record::append_mode(const ModeState& mode, double interval) {
    const auto& re = columns_[cursor_ + 4].values;  // as ordered in add_mode_columns
    const auto& im = columns_[cursor_ + 5].values;
    const std::complex<double> before = re.empty() ? 0.0 : std::complex<double>(re.back(), im.back());
    push(std::abs(mode.forward));
    push(std::abs(mode.backward));
    push(mode.energy);
    push(branch_frequency(before, mode.forward, interval, mode.frequency) * 1e-9);
    push(mode.forward.real());
    push(mode.forward.imag());
}

void Record::append_charge(const SpaceView& view) {
    const PolarGrid& grid = view.grid;
    std::fill(ring_.begin(), ring_.end(), 0.0);
    for (int i = (grid.n_r + 1) / 2; i <= grid.n_r; ++i) {  // rows at and beyond mid-gap
        for (std::size_t j = 0; j < ring_.size(); ++j) ring_[j] += view.node_charge[grid.node(i, 0) + j];
    }
    fourier_.forward(ring_, spectrum_);
    for (int m = 0; m <= harmonics_; ++m) push(std::abs(spectrum_[static_cast<std::size_t>(m)]));
}

void Record::append_ledger(const SpaceView& view) {
    push(totals_.supply_energy);
    push(totals_.prime_energy);
    push(totals_.drive_energy);
    push(totals_.emission_energy);
    push(totals_.wall_loss);
    push(totals_.load_energy);
    push(totals_.anode_energy);
    push(totals_.cathode_energy);
    push(view.kinetic_energy);
    push(view.space_charge_energy);
    push(view.resonator_energy);
    push(100 * view.self_field_share);
}

const std::vector<double>& Record::column(std::string_view name) const {
    for (const Column& column : columns_) {
        if (column.name == name) return column.values;
    }
    throw std::out_of_range(fmt::format("record: no column '{}'", name));
}

const std::vector<double>& Record::mode_column(int mode, std::string_view quantity) const {
    return column(fmt::format("mode_{}_{}", mode, quantity));
}

double Record::last(std::string_view name) const {
    const auto& values = column(name);
    return values.empty() ? std::numeric_limits<double>::quiet_NaN() : values.back();
}

std::vector<double> Record::state() const {
    std::vector<double> state;
    for (const RunningTotals& totals : {totals_, mark_}) {
        const auto plain = std::bit_cast<PlainTotals>(totals);
        state.insert(state.end(), plain.begin(), plain.end());
    }
    return state;
}

void Record::restore(std::vector<Column> columns, std::span<const double> state) {
    const auto same_name = [](const Column& a, const Column& b) { return a.name == b.name; };
    const bool fits = columns.size() == columns_.size() && state.size() == 2 * kTotalsLength &&
                      std::equal(columns.begin(), columns.end(), columns_.begin(), same_name) &&
                      std::all_of(columns.begin(), columns.end(), [&](const Column& column) {
                          return column.values.size() == columns.front().values.size();
                      });
    if (!fits) {
        throw FileError("the saved series do not belong to this deck or version; start the run again without --resume");
    }
    columns_ = std::move(columns);
    PlainTotals plain;
    std::copy_n(state.begin(), kTotalsLength, plain.begin());
    totals_ = std::bit_cast<RunningTotals>(plain);
    std::copy_n(state.begin() + kTotalsLength, kTotalsLength, plain.begin());
    mark_ = std::bit_cast<RunningTotals>(plain);
}

}  // namespace spokewright
