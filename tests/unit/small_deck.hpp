// SPDX-License-Identifier: MIT
// A small good deck for the tests of the reader, and the message that a change of it gives.
#pragma once

#include <doctest/doctest.h>

#include <string>
#include <vector>

#include "inputs/deck_reader.hpp"
#include "inputs/errors.hpp"
#include "tests/scratch_folder.hpp"

namespace spokewright {

inline constexpr double kRounding = 4e-16;  // a decimal unit factor may cost two roundings

// Line numbers count in the messages below.
inline const std::string kSmallDeck =
    "[tube]\n"
    "cathode_radius_mm = 2\n"
    "anode_radius_mm = 4.6\n"
    "axial_height_mm = 10\n"
    "vane_count = 10\n"
    "[supply]\n"
    "anode_voltage_V = 4150\n"
    "[magnet]\n"
    "field_T = 0.175\n";

inline const std::string kCircuit =
    "[circuit]\n"
    "source = table\n"
    "mode_numbers = 3, 5\n"
    "frequencies_GHz = 4.4 2.45\n"
    "unloaded_Q = 1500\n"
    "external_Q = 167\n"
    "capacitance_pF = 1 2\n";

inline std::string replaced(std::string text, const std::string& old_part, const std::string& new_part) {
    const std::size_t at = text.find(old_part);
    REQUIRE(at != std::string::npos);
    return text.replace(at, old_part.size(), new_part);
}

inline Deck read_text(const std::string& text, const std::vector<std::string>& overrides = {}) {
    const ScratchFolder folder;
    return read_deck(folder.write("tube.ini", text), overrides);
}

// The message without the folder, so that it can be stated in full.
inline std::string message_of(const std::string& text, const std::vector<std::string>& overrides = {}) {
    const ScratchFolder folder;
    try {
        read_deck(folder.write("tube.ini", text), overrides);
    } catch (const InputError& error) {
        const std::string message = error.what();
        const std::string prefix = folder.path().string() + "/";
        return message.starts_with(prefix) ? message.substr(prefix.size()) : message;
    }
    return "no error";
}

inline std::string override_message(const std::string& text) {
    return message_of(kSmallDeck + kCircuit, {text});
}

}  // namespace spokewright
