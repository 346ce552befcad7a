// SPDX-License-Identifier: MIT
#include "diagnostics/archive_blocks.hpp"

#include <utility>

#include "inputs/constants.hpp"

namespace spokewright {

Snapshot take_snapshot(const SpaceView& view, ElectronSnapshot electrons) {
    const PolarGrid& grid = view.grid;
    Snapshot snapshot;
    snapshot.time = view.time;
    snapshot.rows = static_cast<std::size_t>(grid.n_r) + 1;
    snapshot.columns = static_cast<std::size_t>(grid.n_theta);
    snapshot.density.reserve(view.node_charge.size());
    for (int i = 0; i <= grid.n_r; ++i) {
        const double per_charge = -1 / (kElementaryCharge * grid.node_volume(i));
        for (int j = 0; j < grid.n_theta; ++j) {
            snapshot.density.push_back(view.node_charge[grid.node(i, j)] * per_charge);
        }
    }
    snapshot.potential.assign(view.potential.begin(), view.potential.end());
    snapshot.electrons = std::move(electrons);
    return snapshot;
}

void write_columns(Hdf5File& file, const std::string& group, const std::vector<Column>& columns) {
    for (const Column& column : columns) {
        file.write(group + "/" + column.name, column.values, {column.unit, column.description});
    }
}

std::vector<Column> read_columns(const Hdf5File& file, const std::string& group) {
    std::vector<Column> columns;
    for (const std::string& name : file.list(group)) {
        const std::string path = group + "/" + name;
        Label label = file.label(path);
        columns.push_back({name, std::move(label.unit), std::move(label.description), file.read<double>(path)});
    }
    return columns;
}

void write_wall_book(Hdf5File& file, const std::string& group, const WallBook& book,
                     const std::vector<std::string>& sectors, double macro_weight) {
    file.write_texts(group + "/sector", sectors, "name of each sector, in +theta");
    file.write(group + "/hits", book.sector_hits, {"1", "macro-electrons that struck each sector"});
    file.write(group + "/energy_booked", book.sector_energy,
               {"eV/1024", "kinetic energy left on each sector, per real electron of a macro-electron"});
    std::vector<double> charge, energy, lower_edge;
    for (const std::int64_t hits : book.sector_hits) {
        charge.push_back(-static_cast<double>(hits) * macro_weight * kElementaryCharge);
    }
    for (const std::int64_t units : book.sector_energy) {
        energy.push_back(static_cast<double>(units) * WallBook::kBookedEnergyUnit * macro_weight * kElementaryCharge);
    }
    for (std::size_t bin = 0; bin < book.energy_histogram.size(); ++bin) {
        lower_edge.push_back(static_cast<double>(bin) * book.energy_range / WallBook::kEnergyBins);
    }
    file.write(group + "/charge_C", charge, {"C", "charge that struck each sector"});
    file.write(group + "/energy_J", energy, {"J", "kinetic energy left on each sector"});
    file.write(group + "/impact_energy_hits", book.energy_histogram,
               {"1", "macro-electrons by impact energy; the last bin holds all above"});
    file.write(group + "/impact_energy_eV", lower_edge, {"eV", "lower edge of each bin of impact_energy_hits"});
    file.write_number(group + "/impact_energy_range_eV", book.energy_range, {"eV", "upper edge of the last bin"});
}

WallBook read_wall_book(const Hdf5File& file, const std::string& group) {
    WallBook book;
    book.energy_range = file.read_number<double>(group + "/impact_energy_range_eV");
    book.sector_hits = file.read<std::int64_t>(group + "/hits");
    book.sector_energy = file.read<std::int64_t>(group + "/energy_booked");
    book.energy_histogram = file.read<std::int64_t>(group + "/impact_energy_hits");
    return book;
}

void write_snapshot(Hdf5File& file, const std::string& group, const Snapshot& snapshot) {
    const std::vector<std::size_t> shape{snapshot.rows, snapshot.columns};
    file.write_number(group + "/time_s", snapshot.time, {"s", "tube time of the snapshot"});
    file.write(group + "/density_per_m3", snapshot.density, {"1/m^3", "electron density at the nodes [r][theta]"},
               shape);
    file.write(group + "/potential_V", snapshot.potential, {"V", "potential at the nodes [r][theta]"}, shape);
    file.write(group + "/electron_radius_m", snapshot.electrons.radius, {"m", "radius of each macro-electron"});
    file.write(group + "/electron_theta_rad", snapshot.electrons.theta, {"rad", "angle of each macro-electron"});
    file.write(group + "/electron_u_r", snapshot.electrons.u_r, {"m/s", "gamma times radial velocity"});
    file.write(group + "/electron_u_theta", snapshot.electrons.u_theta, {"m/s", "gamma times azimuthal velocity"});
}

Snapshot read_snapshot(const Hdf5File& file, const std::string& group) {
    Snapshot snapshot;
    snapshot.time = file.read_number<double>(group + "/time_s");
    snapshot.density = file.read<double>(group + "/density_per_m3");
    snapshot.potential = file.read<double>(group + "/potential_V");
    const auto shape = file.shape(group + "/density_per_m3");
    snapshot.rows = shape.at(0);
    snapshot.columns = shape.at(1);
    snapshot.electrons = {file.read<float>(group + "/electron_radius_m"),
                          file.read<float>(group + "/electron_theta_rad"), file.read<float>(group + "/electron_u_r"),
                          file.read<float>(group + "/electron_u_theta")};
    return snapshot;
}

}  // namespace spokewright
