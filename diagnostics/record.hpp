// SPDX-License-Identifier: MIT
// The series of a run: one row a sample, one column a quantity. A step only adds; a sample closes the interval since
// the last one, turns charges and energies into mean currents and powers, and appends a row. The unit stands in each
// name.
#pragma once

#include <complex>
#include <cstddef>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "diagnostics/tally.hpp"
#include "fields/aligned.hpp"
#include "fields/fourier.hpp"
#include "inputs/deck.hpp"

namespace spokewright {

struct Column {
    std::string name;
    std::string unit;
    std::string description;
    std::vector<double> values;
};

/// Sums since the start of the run. Doubles only: counts stay exact below 2^53, and the struct is its own file format.
struct RunningTotals {
    double time = 0;                                                          // s, sum of the steps
    double induced_charge = 0;                                                // C
    double primaries = 0, secondaries = 0, anode_hits = 0, cathode_hits = 0;  // macro-electrons
    double supply_energy = 0, prime_energy = 0, drive_energy = 0, mode_energy = 0, wall_loss = 0, load_energy = 0;  // J
    double emission_energy = 0, anode_energy = 0, cathode_energy = 0;                                               // J
    double electron_steps = 0;   // sum of the electrons in flight over the steps
    double anode_voltage = 0;    // V, at the last step (not a sum)
    double charge_mismatch = 0;  // macro-electrons, the largest seen at a sample (not a sum)
};

class Record {
public:
    /// Columns for the deck's modes and for the azimuthal harmonics 0..N of the charge (0..16 in a smooth bore).
    explicit Record(const Deck& deck);

    /// One step: additions only.
    void add(const Tally& tally);

    /// Closes the interval and appends one row. Throws std::logic_error when the view's modes are not the deck's.
    void sample(const SpaceView& view);

    std::size_t samples() const { return columns_.front().values.size(); }
    const std::vector<Column>& columns() const { return columns_; }
    /// The values of one column; std::out_of_range for an unknown name.
    const std::vector<double>& column(std::string_view name) const;
    const std::vector<double>& mode_column(int mode, std::string_view quantity) const;  // "voltage_V", "energy_J", ...
    double last(std::string_view name) const;                                           // NaN before the first sample
    int charge_harmonics() const { return harmonics_; }  // highest m of charge_harmonic_m_C
    const RunningTotals& totals() const { return totals_; }

    /// What a restart needs beside the columns; `restore` takes it back and the run goes on to the last bit.
    std::vector<double> state() const;
    /// Throws FileError when the columns' names or the length of the state do not fit this deck.
    void restore(std::vector<Column> columns, std::span<const double> state);

private:
    void append_interval(const SpaceView& view);
    void append_mode(const ModeState& mode, double interval);
    void append_charge(const SpaceView& view);
    void append_ledger(const SpaceView& view);
    void push(double value) { columns_[cursor_++].values.push_back(value); }

    std::vector<Column> columns_;
    std::vector<int> mode_numbers_;
    int harmonics_;
    std::size_t cursor_ = 0;  // column that `push` fills next within a sample
    RunningTotals totals_;
    RunningTotals mark_;  // totals at the last sample
    RowFourier fourier_;
    AlignedVector<double> ring_;                    // outer charge by angle
    AlignedVector<std::complex<double>> spectrum_;  // its harmonics
};

/// Radius at which the azimuthally averaged density falls through half of its peak for the last time going outwards, m;
/// linear between rows. The cathode radius without electrons. `node_charge` [n_r + 1][n_theta].
double hub_radius(const PolarGrid& grid, std::span<const double> node_charge);

}  // namespace spokewright
