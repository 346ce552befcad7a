// SPDX-License-Identifier: MIT
// The blocks of which run.h5 and state.h5 are made, each written and read back in one place. `group` is a path without
// a slash at its end.
#pragma once

#include <string>
#include <vector>

#include "diagnostics/hdf5_file.hpp"
#include "diagnostics/record.hpp"
#include "diagnostics/tally.hpp"
#include "diagnostics/wall_books.hpp"

namespace spokewright {

/// The interaction space at one instant.
struct Snapshot {
    double time = 0;                // s
    std::vector<double> density;    // electrons per m^3, [n_r + 1][n_theta]
    std::vector<double> potential;  // V, [n_r + 1][n_theta]
    ElectronSnapshot electrons;
    std::size_t rows = 0, columns = 0;  // n_r + 1, n_theta
};

Snapshot take_snapshot(const SpaceView& view, ElectronSnapshot electrons);

/// One dataset a column, in order; read back with units and descriptions.
void write_columns(Hdf5File& file, const std::string& group, const std::vector<Column>& columns);
std::vector<Column> read_columns(const Hdf5File& file, const std::string& group);

/// Counts and booked units as whole numbers (to go on from) and, for people, charge and energy in SI and the axes.
void write_wall_book(Hdf5File& file, const std::string& group, const WallBook& book,
                     const std::vector<std::string>& sectors, double macro_weight);
WallBook read_wall_book(const Hdf5File& file, const std::string& group);

void write_snapshot(Hdf5File& file, const std::string& group, const Snapshot& snapshot);
Snapshot read_snapshot(const Hdf5File& file, const std::string& group);

}  // namespace spokewright
