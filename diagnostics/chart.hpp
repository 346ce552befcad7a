// SPDX-License-Identifier: MIT
// The operating chart of a deck: what closed forms say of the tube before any electron moves. Numbers in SI units at
// the deck's nominal voltage and mean field; the formulas and their sources are those of theory.hpp.
#pragma once

#include <string>
#include <vector>

#include "inputs/deck.hpp"

namespace spokewright {

/// A number with relativistic electrons and the same without; NaN where it cannot be told.
struct ChartValue {
    double value;
    double nonrelativistic;
};

/// One space harmonic m = n + k N of a mode: a wave of angular speed omega / m. It turns against the mode's own wave
/// when m < 0; a mode stands or has two polarisations, so that the electrons meet it at omega / |m| all the same.
struct ChartWave {
    int mode;  // n
    int k;
    int harmonic;      // m
    double frequency;  // Hz
    ChartValue synchronous_voltage;
    ChartValue synchronous_field;
    ChartValue hartree_voltage;  // NaN below the synchronous field: no electron can be in step
};

/// Anode voltages between the pi mode's threshold and the next thing above it.
struct VoltageWindow {
    double low;         // V, NaN without a threshold of the pi mode
    double high;        // V
    int limiting_mode;  // 0: the Hull voltage
    int limiting_harmonic;
    std::vector<ChartWave> below;  // waves of other modes whose thresholds are at or below that of the pi mode
};

struct Chart {
    std::string tube_name;
    std::string deck_path;
    std::string deck_sha256;

    double voltage;
    double field;
    bool field_from_table;
    double cathode_radius;
    double anode_radius;
    double height;
    int vane_count;

    double cyclotron_frequency;  // Hz
    ChartValue hull_voltage;     // NaN without a field
    ChartValue hull_field;       // T, at the deck's voltage

    ChartValue hub_radius;  // NaN without a field and from the Hull voltage up
    ChartValue hub_speed;
    ChartValue hub_charge;       // C, over the height
    ChartValue limited_current;  // A, without field, over the height

    std::vector<ChartWave>
        waves;               // every mode of the deck with k = 0, -1, 1, by mode number; without the pi mode's twin
    std::string no_pi_mode;  // why there are no numbers of a pi mode; "" where there are
    ChartWave pi;            // its own wave, k = 0
    VoltageWindow window;    // by the modes' own waves, k = 0
    VoltageWindow harmonic_window;  // counting the space harmonics in `waves`

    ChartValue drift_bound;    // of the electronic efficiency, NaN at voltages below V0
    ChartValue cycloid_bound;  // NaN below 2 V0
    double loaded_q;           // of the pi mode in the deck's load
    double circuit_efficiency;
    double total_bound;     // drift bound times circuit efficiency
    double pulling_figure;  // Hz, VSWR 1.5

    double expected_current;  // A
    double cathode_supply;    // A, infinity: as much as the space charge lets through
    bool above_hull;
    bool secondary_emission;

    double electrical_radius;  // omega r_a / c, pi mode
    double wave_beta;          // speed of the pi wave at r_a over c
    double electron_gamma;     // after the full voltage
    double electron_beta;
};

Chart operating_chart(const Deck& deck);

}  // namespace spokewright
