// SPDX-License-Identifier: MIT
#include "inputs/deck_rules.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <filesystem>
#include <limits>

#include "inputs/constants.hpp"
#include "inputs/deck_values.hpp"
#include "inputs/field_table.hpp"
#include "inputs/text_file.hpp"

namespace spokewright {

namespace {

constexpr Unit kNanosecond{"ns", 1e-9};
constexpr Unit kGigahertz{"GHz", 1e9};
constexpr int kLargestAzimuthalCells = 504;
constexpr int kSmallestAzimuthalCells = 8;

int read_count(std::string_view text, int low, int high) {
    return static_cast<int>(read_integer(text, low, high));
}

void require_mode_number(int mode, int vane_count) {
    if (mode >= 1 && mode <= vane_count / 2) return;
    if (vane_count == 0) throw BadValue(fmt::format("mode {} of a smooth bore; allowed: none", mode));
    const bool near_pi = vane_count % 2 == 1 && mode == vane_count / 2 + 1;
    const std::string why = near_pi ? fmt::format("an odd block of {} vanes has no pi mode", vane_count)
                                    : fmt::format("mode {} of {} vanes", mode, vane_count);
    throw BadValue(fmt::format("{}; allowed: mode numbers 1..{}", why, vane_count / 2));
}

double four_figures_down(double value) {
    const double last_figure = std::pow(10.0, std::floor(std::log10(value)) - 3);
    return std::floor(value / last_figure) * last_figure;
}

}  // namespace

void require_anode_outside_cathode(const Deck& deck) {
    if (deck.tube.anode_radius > deck.tube.cathode_radius) return;
    throw BadValue(fmt::format("{:g} mm is not outside the cathode; allowed: more than cathode_radius_mm = {:g}",
                               deck.tube.anode_radius * 1e3, deck.tube.cathode_radius * 1e3));
}

void read_vane_count(Deck& deck, std::string_view text) {
    deck.tube.vane_count = read_count(text, 0, 60);
    if (deck.tube.vane_count > 0 && deck.tube.vane_count < 4) {
        throw BadValue(fmt::format("{} vanes; allowed: 0 (smooth bore) or 4..60", deck.tube.vane_count));
    }
}

void read_programme(Deck& deck, std::string_view text) {
    std::vector<ProgrammePoint>& programme = deck.supply.programme;
    programme.clear();
    for (const std::string_view item : list_items(text)) {
        const std::size_t colon = item.find(':');
        if (colon == std::string_view::npos) {
            throw BadValue(fmt::format("{} is not a pair; allowed: pairs time_ns:share such as 0:0 5:1", quoted(item)));
        }
        const double time = read_real(item.substr(0, colon), between(0, 1e6), kNanosecond) * kNanosecond.to_si;
        const double share = read_real(item.substr(colon + 1), between(0, 2), kNoUnit);
        if (!programme.empty() && time <= programme.back().time) {
            throw BadValue(fmt::format("the time of {} does not rise; allowed: strictly rising times", quoted(item)));
        }
        programme.push_back({time, share});
    }
}

std::string programme_text(const Deck& deck) {
    // rise_time_ns has left its two points in the programme. Twelve figures hide the rounding of ns to s and back.
    const double rise = deck.supply.programme.back().time / kNanosecond.to_si;
    return rise > 0 ? fmt::format("0:0 {:.12g}:1", rise) : "0:1";
}

void read_field_table_key(Deck& deck, std::string_view text) {
    if (text.empty()) throw BadValue("empty; allowed: the name of a file");
    const std::filesystem::path path = std::filesystem::path(deck.path).parent_path() / std::filesystem::path(text);
    deck.magnet.table = read_field_table(path.string(), deck.tube.cathode_radius, deck.tube.anode_radius);
}

std::string thermal_energy_text(const Deck& deck) {
    return fmt::format("{:.6g}", kBoltzmann * deck.cathode.temperature / kElementaryCharge);
}

void read_circuit_source(Deck& deck, std::string_view text) {
    deck.circuit.source = read_choice(text, {"none", "table"}) == 0 ? CircuitSource::none : CircuitSource::table;
    if (deck.circuit.source == CircuitSource::table && deck.tube.vane_count == 0) {
        throw BadValue("a smooth bore has no resonators; allowed: none, or a vane_count of 4..60");
    }
}

void read_mode_numbers(Deck& deck, std::string_view text) {
    if (deck.circuit.source == CircuitSource::none) return;
    for (const std::string_view item : list_items(text)) {
        const int mode = read_count(item, 0, 1000);
        require_mode_number(mode, deck.tube.vane_count);
        if (std::ranges::count(deck.circuit.modes, mode, &ModeEntry::number) > 0) {
            throw BadValue(fmt::format("mode {} stands twice; allowed: each mode number once", mode));
        }
        deck.circuit.modes.push_back({mode, 0, 0, 0, 0});
    }
}

namespace {

int read_mode(const Deck& deck, std::string_view text) {
    const int mode = read_count(text, 0, 1000);
    if (mode != 0) require_mode_number(mode, deck.tube.vane_count);
    return mode;
}

/// `section` names the mode's key, `nothing` the value that needs no mode.
void require_mode_in_circuit(const Deck& deck, int mode, std::string_view section, std::string_view nothing) {
    if (mode == 0 && deck.tube.vane_count % 2 == 1) {
        throw BadValue(fmt::format("an odd block of {} vanes has no pi mode; allowed: a {}.mode of 1..{}",
                                   deck.tube.vane_count, section, deck.tube.vane_count / 2));
    }
    if (std::ranges::count(deck.circuit.modes, mode, &ModeEntry::number) == 0) {
        std::vector<int> numbers;
        for (const ModeEntry& entry : deck.circuit.modes) numbers.push_back(entry.number);
        throw BadValue(fmt::format("mode {} is not in circuit.mode_numbers; allowed: {}, or one of the modes {}", mode,
                                   nothing, numbers.empty() ? "(none)" : fmt::format("{}", fmt::join(numbers, ", "))));
    }
}

/// Cold frequency of the driven mode, Hz; 0 when the circuit does not have it.
double driven_frequency(const Deck& deck) {
    const auto mode = std::ranges::find(deck.circuit.modes, deck.drive.mode, &ModeEntry::number);
    return mode == deck.circuit.modes.end() ? 0 : mode->frequency;
}

}  // namespace

void read_prime_mode(Deck& deck, std::string_view text) {
    deck.prime.mode = read_mode(deck, text);
}

std::string pi_mode_text(const Deck& deck) {
    return std::to_string(deck.tube.vane_count % 2 == 0 ? deck.tube.vane_count / 2 : 0);
}

void require_primed_mode(const Deck& deck) {
    if (deck.prime.voltage > 0) require_mode_in_circuit(deck, deck.prime.mode, "prime", "0 V");
}

void read_drive_mode(Deck& deck, std::string_view text) {
    deck.drive.mode = read_mode(deck, text);
}

void require_driven_mode(const Deck& deck) {
    if (deck.drive.power <= 0) return;
    require_mode_in_circuit(deck, deck.drive.mode, "drive", "0 W");
    if (deck.load.vswr != 1) {
        throw BadValue(fmt::format("given beside load.vswr = {}; allowed: 0 W, or a matched load (load.vswr = 1)",
                                   deck.load.vswr));
    }
}

void read_drive_frequency(Deck& deck, std::string_view text) {
    constexpr double kReach = 0.2;  // of the mode's frequency: beyond, the mode's resonator says nothing true
    const double cold = driven_frequency(deck);
    deck.drive.frequency = read_real(text, between(0, 1000), kGigahertz) * kGigahertz.to_si;
    if (deck.drive.power > 0 && std::abs(deck.drive.frequency - cold) > kReach * cold) {
        throw BadValue(fmt::format("{} GHz is far from mode {} at {:g} GHz; allowed: {:g}..{:g} GHz", text,
                                   deck.drive.mode, cold * 1e-9, (1 - kReach) * cold * 1e-9,
                                   (1 + kReach) * cold * 1e-9));
    }
}

std::string drive_frequency_text(const Deck& deck) {
    return fmt::format("{:.10g}", driven_frequency(deck) * 1e-9);
}

void read_radial_cells(Deck& deck, std::string_view text) {
    deck.grid.radial_cells = read_count(text, 8, 120);
    const double width = (deck.tube.anode_radius - deck.tube.cathode_radius) / deck.grid.radial_cells;
    if (width <= deck.tube.cathode_radius) return;
    throw BadValue(
        fmt::format("{} cells are {:.3g} mm wide each; allowed: cells no wider than cathode_radius_mm = {:g}",
                    deck.grid.radial_cells, width * 1e3, deck.tube.cathode_radius * 1e3));
}

void read_azimuthal_cells(Deck& deck, std::string_view text) {
    const int cells = read_count(text, kSmallestAzimuthalCells, kLargestAzimuthalCells);
    const int vanes = deck.tube.vane_count;
    if (vanes > 0 && cells % vanes != 0) {
        const int below = cells / vanes * vanes;
        const int next = below + vanes;
        const std::string nearest = below < kSmallestAzimuthalCells ? std::to_string(next)
                                    : next > kLargestAzimuthalCells ? std::to_string(below)
                                                                    : fmt::format("{} or {}", below, next);
        throw BadValue(fmt::format("{} is not a multiple of vane_count = {}; allowed: {}", cells, vanes, nearest));
    }
    deck.grid.azimuthal_cells = cells;
}

std::string azimuthal_cells_text(const Deck& deck) {
    const int vanes = deck.tube.vane_count;
    return std::to_string(vanes == 0 ? 64 : vanes * std::min(16, kLargestAzimuthalCells / vanes));
}

std::string step_text(const Deck& deck) {
    const double cyclotron_frequency = kElementaryCharge * mean_field(deck) / kElectronMass;  // rad/s
    const double gain = kElementaryCharge * deck.supply.anode_voltage / (kElectronMass * kLightSpeed * kLightSpeed);
    const double fastest = kLightSpeed * std::sqrt(gain * (2 + gain)) / (1 + gain);
    const double transit = (deck.tube.anode_radius - deck.tube.cathode_radius) / fastest;
    double step = 2 * transit / deck.grid.radial_cells;  // or an electron would leap over cells unfelt
    if (cyclotron_frequency > 0) step = std::min(step, 0.1 / cyclotron_frequency);
    for (const ModeEntry& mode : deck.circuit.modes) step = std::min(step, 1 / (60 * mode.frequency));
    // A diode without field has nothing slower than the transit to follow.
    if (cyclotron_frequency == 0 && deck.circuit.modes.empty()) step = std::min(step, transit / 100);
    return fmt::format("{:.4g}", four_figures_down(step * 1e12));
}

void require_reachable_end(const Deck& deck) {
    constexpr double kMostSteps = 1e9;  // weeks, even of a small tube
    const double steps = deck.clock.end_time / deck.clock.step;
    if (steps <= kMostSteps) return;
    throw BadValue(fmt::format("{:g} ns are {:.3g} steps of {:g} ps; allowed: at most {:g} steps",
                               deck.clock.end_time * 1e9, steps, deck.clock.step * 1e12, kMostSteps));
}

void read_snapshot_times(Deck& deck, std::string_view text) {
    std::vector<double>& times = deck.output.snapshot_times;
    if (text == "none") return;
    for (const std::string_view item : list_items(text)) {
        const double time = read_real(item, between(0, 1e6), kNanosecond) * kNanosecond.to_si;
        if (!times.empty() && time <= times.back()) {
            throw BadValue(fmt::format("{} does not rise; allowed: strictly rising times, or none", escaped(item)));
        }
        times.push_back(time);
    }
}

}  // namespace spokewright
