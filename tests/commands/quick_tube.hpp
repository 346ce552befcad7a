// SPDX-License-Identifier: MIT
// A ten-vane tube on a coarse grid with few electrons: 2 ns of it take a tenth of a second, without a warning at the
// start. Invented numbers. Line numbers count in the messages of test_bad_input.cpp.
#pragma once

#include <doctest/doctest.h>

#include <string>

namespace spokewright {

inline const std::string kQuickTube =
    "[tube]\n"
    "cathode_radius_mm = 2\n"
    "anode_radius_mm = 4.6\n"
    "axial_height_mm = 10\n"
    "vane_count = 10\n"
    "[supply]\n"
    "anode_voltage_V = 4150\n"
    "programme = 0:0 0.2:1\n"
    "[magnet]\n"
    "field_T = 0.175\n"
    "[circuit]\n"
    "source = table\n"
    "mode_numbers = 4 5\n"
    "frequencies_GHz = 3.2 2.45\n"
    "unloaded_Q = 1500\n"
    "external_Q = 167\n"
    "capacitance_pF = 1\n"
    "[prime]\n"
    "mode = 5\n"
    "voltage_V = 600\n"
    "[grid]\n"
    "radial_cells = 40\n"
    "azimuthal_cells = 100\n"
    "[electrons]\n"
    "target_count = 5000\n"
    "[clock]\n"
    "end_time_ns = 2\n";

/// The quick tube with one part of its text replaced.
inline std::string quick_tube_with(const std::string& old_part, const std::string& new_part) {
    std::string text = kQuickTube;
    const std::size_t at = text.find(old_part);
    REQUIRE(at != std::string::npos);
    return text.replace(at, old_part.size(), new_part);
}

}  // namespace spokewright
