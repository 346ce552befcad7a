// SPDX-License-Identifier: MIT
#include "pic/checkpoint.hpp"

#include <fmt/format.h>

#include <sstream>

#include "diagnostics/hdf5_file.hpp"
#include "inputs/errors.hpp"

namespace spokewright {
namespace {

/// The resolved deck without what a resumed run may change.
std::vector<std::string> fixed_lines(const std::string& resolved_text) {
    std::vector<std::string> lines;
    std::istringstream in(resolved_text);
    std::string section;
    for (std::string line; std::getline(in, line);) {
        if (!line.empty() && line.front() == '[') {
            section = line;
        }
        if (section != "[output]" && !line.starts_with("end_time_ns") && !line.starts_with("stop_half_width")) {
            lines.push_back(line);
        }
    }
    return lines;
}

void require_same_deck(const std::string& path, const std::string& stored, const std::string& resolved) {
    const auto before = fixed_lines(stored);
    const auto now = fixed_lines(resolved);
    for (std::size_t k = 0; k < std::max(before.size(), now.size()); ++k) {
        const std::string old_line = k < before.size() ? before[k] : "";
        const std::string new_line = k < now.size() ? now[k] : "";
        if (old_line != new_line) {
            throw InputError(fmt::format(
                "{}: was made from another deck: '{}' there, '{}' now; --resume allows a new clock.end_time_ns, "
                "clock.stop_half_width_percent and [output] section",
                path, old_line, new_line));
        }
    }
}

}  // namespace

void write_checkpoint(const std::string& path, const Deck& deck, const Checkpoint& checkpoint, double macro_weight) {
    const SpaceState& space = checkpoint.space;
    Hdf5File file = Hdf5File::create(path);
    file.write_text("/deck/resolved", deck.resolved_text, "every key with the value in force when this was written");
    file.write_number("/clock/step", space.step, {"1", "steps made"});
    file.write_number("/clock/wall_clock_s", checkpoint.wall_clock, {"s", "time spent by all legs of the run"});
    const auto electrons = [&](const char* name, const auto& values, const Label& label) {
        file.write(std::string("/electrons/") + name, std::span(values.data(), values.size()), label);
    };
    electrons("r", space.electrons.r, {"2^-24 radial cell", "distance from the cathode"});
    electrons("theta", space.electrons.theta, {"2^-22 azimuthal cell", "angle from the centre of vane 0"});
    electrons("u_r", space.electrons.u_r, {"radial cells a step", "gamma v_r, half a step before the state"});
    electrons("u_theta", space.electrons.u_theta, {"radial cells a step", "gamma v_theta, half a step before"});
    file.write("/circuit/voltage_V", space.resonator_voltage, {"V", "of each resonator"});
    file.write("/circuit/current_A", space.resonator_current, {"A", "in the inductance of each resonator"});
    file.write_number("/circuit/anode_voltage_V", space.anode_voltage, {"V", "at the tube's terminals"});
    file.write("/circuit/self_field_T", space.self_field, {"T", "of the azimuthal current, by row"});
    write_wall_book(file, "/walls/anode", space.books.anode, {}, macro_weight);
    write_wall_book(file, "/walls/cathode", space.books.cathode, {}, macro_weight);
    write_columns(file, "/series", checkpoint.columns);
    file.write("/record/state", checkpoint.record_state, {"mixed", "running totals of the record"});
    for (std::size_t k = 0; k < checkpoint.snapshots.size(); ++k) {
        write_snapshot(file, fmt::format("/snapshots/{}", k), checkpoint.snapshots[k]);
    }
    file.commit();
}

Checkpoint read_checkpoint(const std::string& path, const Deck& deck) {
    const Hdf5File file = Hdf5File::open_sealed(path);
    require_same_deck(path, file.read_text("/deck/resolved"), deck.resolved_text);
    Checkpoint checkpoint;
    SpaceState& space = checkpoint.space;
    space.step = file.read_number<std::int64_t>("/clock/step");
    checkpoint.wall_clock = file.read_number<double>("/clock/wall_clock_s");
    const auto r = file.read<std::int32_t>("/electrons/r");
    const auto theta = file.read<std::int32_t>("/electrons/theta");
    const auto u_r = file.read<float>("/electrons/u_r");
    const auto u_theta = file.read<float>("/electrons/u_theta");
    if (theta.size() != r.size() || u_r.size() != r.size() || u_theta.size() != r.size()) {
        throw FileError(fmt::format("{}: the electrons' arrays differ in length; start the run anew", path));
    }
    for (std::size_t p = 0; p < r.size(); ++p) {
        space.electrons.append({r[p], theta[p], u_r[p], u_theta[p]});
    }
    space.resonator_voltage = file.read<double>("/circuit/voltage_V");
    space.resonator_current = file.read<double>("/circuit/current_A");
    space.anode_voltage = file.read_number<double>("/circuit/anode_voltage_V");
    space.self_field = file.read<double>("/circuit/self_field_T");
    space.books = {read_wall_book(file, "/walls/anode"), read_wall_book(file, "/walls/cathode")};
    checkpoint.columns = read_columns(file, "/series");
    checkpoint.record_state = file.read<double>("/record/state");
    for (const std::string& name : file.list("/snapshots")) {
        checkpoint.snapshots.push_back(read_snapshot(file, "/snapshots/" + name));
    }
    return checkpoint;
}

}  // namespace spokewright
