// SPDX-License-Identifier: MIT
// A deck: one tube and one hot run, as plain structs in SI units (m, s, V, T, A, C, rad).
// The structs hold what the simulator needs; the keys a user types stand in deck_keys.cpp.
#pragma once

#include <cstdint>
#include <string>
#include <vector>

namespace spokewright {

struct TubeSettings {
    std::string name;
    double cathode_radius = 0;  // m
    double anode_radius = 0;    // m, to the vane tips
    double axial_height = 0;    // m
    int vane_count = 0;         // 0 = smooth bore
    double gap_share = 0.4;     // gap width / vane pitch
};

struct ProgrammePoint {
    double time;   // s
    double share;  // of the anode voltage
};

struct SupplySettings {
    double anode_voltage = 0;               // V, nominal
    std::vector<ProgrammePoint> programme;  // piecewise linear, constant beyond its ends; never empty in a read deck
    double series_resistance = 0;           // ohm
    double shunt_capacitance = 0;           // F, beside the tube's own cathode-anode capacitance
    double regulated_current = 0;  // A; 0 = voltage supply, else a current source under the programme's voltage
};

struct FieldSample {
    double radius;  // m
    double field;   // T
};

struct MagnetSettings {
    double field = 0;                // T, uniform; unused when the table is not empty
    std::vector<FieldSample> table;  // B_z(r), rising radius, covers cathode to anode
    double field_scale = 1;          // multiplies either
    bool self_field = false;         // add the field of the electrons' azimuthal current
};

enum class EmissionLaw { space_charge, thermionic };

struct CathodeSettings {
    EmissionLaw emission = EmissionLaw::space_charge;
    double temperature = 0;          // K
    double work_function = 0;        // eV
    double richardson_constant = 0;  // A/(m^2 K^2)
    double emission_limit = 0;       // A/m^2, a cap on the primary emission; 0 = none
    double launch_temperature = 0;   // eV, of the launch distribution (resolved: kT of the cathode unless given)
    bool secondary_emission = false;
    double secondary_yield_max = 0;    // Vaughan's delta_max at normal incidence
    double secondary_energy_max = 0;   // eV, impact energy of the maximum
    double secondary_roughness = 1;    // Vaughan's k_s
    double secondary_temperature = 0;  // eV, of the secondaries' launch distribution
};

struct ModeEntry {
    int number;          // azimuthal mode number n, 1..N/2
    double frequency;    // Hz, cold
    double unloaded_q;   // Q_0
    double external_q;   // Q_ext into a matched load
    double capacitance;  // F per resonator, referred to the gap voltage
};

enum class CircuitSource { none, table };

struct CircuitSettings {
    CircuitSource source = CircuitSource::none;
    std::vector<ModeEntry> modes;  // rising mode number
};

struct LoadSettings {
    double vswr = 1;
    double phase = 0;  // rad, of the reflection coefficient
};

struct PrimeSettings {
    int mode = 0;        // azimuthal mode number (resolved: the pi mode unless given)
    double voltage = 0;  // V, starting vane voltage of that mode; 0 = none
    double time = 0;     // s
};

/// A matched generator behind the output coupling of one mode (injection locking).
struct DriveSettings {
    int mode = 0;          // azimuthal mode number (resolved: the pi mode unless given)
    double power = 0;      // W, available from the generator; 0 = none
    double frequency = 0;  // Hz (resolved: the cold frequency of the mode unless given)
    double phase = 0;      // rad, at time 0
    double start = 0;      // s
};

struct GridSettings {
    int radial_cells = 48;    // at most 120
    int azimuthal_cells = 0;  // at most 504; resolved: 16 a vane, or 64 in a smooth bore
};

struct ClockSettings {
    double step = 0;             // s (resolved: see deck_rules.hpp)
    double end_time = 0;         // s
    int sample_every = 16;       // steps
    double stop_half_width = 0;  // share of the mean: 0 runs to the end time
};

struct ElectronSettings {
    std::int64_t target_count = 20000;  // macro-electrons in the Brillouin hub at full voltage
    std::uint64_t seed = 1;
};

struct OutputSettings {
    std::vector<double> snapshot_times;  // s; the last state is always kept
    double checkpoint_interval = 0;      // s of wall clock
};

struct Deck {
    TubeSettings tube;
    SupplySettings supply;
    MagnetSettings magnet;
    CathodeSettings cathode;
    CircuitSettings circuit;
    LoadSettings load;
    PrimeSettings prime;
    DriveSettings drive;
    GridSettings grid;
    ClockSettings clock;
    ElectronSettings electrons;
    OutputSettings output;

    std::string path;                    // as typed
    std::string text;                    // the file, byte for byte
    std::string sha256;                  // of text and overrides
    std::vector<std::string> overrides;  // "section.key=value", in order
    std::string resolved_text;           // every key with the value in force, INI, readable as a deck
};

/// Magnetic field at the anode side used for estimates, T: the uniform field, or the area-weighted mean of the table.
double mean_field(const Deck& deck);

}  // namespace spokewright
