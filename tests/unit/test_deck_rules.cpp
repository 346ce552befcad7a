// SPDX-License-Identifier: MIT
// Keys that depend on other keys: their defaults, and the exact message where they clash.
#include <doctest/doctest.h>

#include <cmath>
#include <string>

#include "inputs/constants.hpp"
#include "inputs/deck.hpp"
#include "tests/relative_error.hpp"
#include "tests/unit/small_deck.hpp"

using namespace spokewright;

TEST_CASE("defaults follow from the other keys") {
    const Deck deck = read_text(kSmallDeck + kCircuit);
    CHECK(deck.tube.gap_share == 0.4);
    CHECK(deck.grid.azimuthal_cells == 160);
    CHECK(deck.prime.mode == 5);
    REQUIRE(deck.supply.programme.size() == 2);
    CHECK(deck.supply.programme[0].share == 0);
    CHECK(relative_error(deck.supply.programme[1].time, 5e-9) < kRounding);
    // kT of 1900 K, written with six figures: half a unit of the sixth
    CHECK(relative_error(deck.cathode.launch_temperature, kBoltzmann * 1900 / kElementaryCharge) < 5e-6);
    // 1/60 of the period of the fastest mode, rounded down to four figures
    const double step = read_text(kSmallDeck + replaced(kCircuit, "4.4 2.45", "8.8 2.45")).clock.step;
    CHECK(step <= 1 / (60 * 8.8e9));
    CHECK(relative_error(step, 1 / (60 * 8.8e9)) < 1e-3);
}

TEST_CASE("the default step without a circuit: orbit, cells at full speed, transit without a field") {
    const auto step = [](const std::vector<std::string>& overrides) {
        return read_text(kSmallDeck, overrides).clock.step;
    };
    constexpr double kFourFigures = 1e-3;  // the default is rounded down to four
    const double gyro_step = 0.1 / (kElementaryCharge * 0.175 / kElectronMass);
    const double gain = 4150 / 510998.95;  // gamma - 1
    const double speed = kLightSpeed * std::sqrt(gain * (2 + gain)) / (1 + gain);
    CHECK(relative_error(step({"grid.radial_cells=24"}), gyro_step) < kFourFigures);
    CHECK(relative_error(step({"grid.radial_cells=100"}), 2 * 2.6e-5 / speed) < kFourFigures);
    CHECK(relative_error(step({"magnet.field_T=0"}), 2.6e-3 / speed / 100) < kFourFigures);
}

TEST_CASE("azimuthal cells default to 16 a vane, 64 in a smooth bore, never more than 504") {
    CHECK(read_text(kSmallDeck, {"tube.vane_count=0"}).grid.azimuthal_cells == 64);
    CHECK(read_text(kSmallDeck, {"tube.vane_count=7"}).grid.azimuthal_cells == 112);
    CHECK(read_text(kSmallDeck, {"tube.vane_count=60"}).grid.azimuthal_cells == 480);
}

TEST_CASE("an instant rise starts at full voltage") {
    const Deck deck = read_text(kSmallDeck, {"supply.rise_time_ns=0"});
    REQUIRE(deck.supply.programme.size() == 1);
    CHECK(deck.supply.programme[0].share == 1);
}

TEST_CASE("modes are sorted by number and lists may hold one value for all") {
    const Deck deck = read_text(kSmallDeck + kCircuit);
    REQUIRE(deck.circuit.modes.size() == 2);
    CHECK(deck.circuit.modes[0].number == 3);
    CHECK(relative_error(deck.circuit.modes[0].frequency, 4.4e9) < kRounding);
    CHECK(relative_error(deck.circuit.modes[0].capacitance, 1e-12) < kRounding);
    CHECK(deck.circuit.modes[1].number == 5);
    CHECK(relative_error(deck.circuit.modes[1].frequency, 2.45e9) < kRounding);
    CHECK(deck.circuit.modes[1].external_q == 167);
    CHECK(relative_error(deck.circuit.modes[1].capacitance, 2e-12) < kRounding);

    const Deck turned = read_text(kSmallDeck + replaced(kCircuit, "3, 5", "5, 3"));
    CHECK(turned.circuit.modes[0].number == 3);
    CHECK(relative_error(turned.circuit.modes[0].frequency, 2.45e9) < kRounding);
}

TEST_CASE("a circuit that is turned off keeps no modes") {
    const Deck deck = read_text(kSmallDeck + kCircuit, {"circuit.source=none"});
    CHECK(deck.circuit.source == CircuitSource::none);
    CHECK(deck.circuit.modes.empty());
}

TEST_CASE("the anode lies outside the cathode") {
    CHECK(
        message_of(replaced(kSmallDeck, "4.6", "2")) ==
        "tube.ini:3: tube.anode_radius_mm: 2 mm is not outside the cathode; allowed: more than cathode_radius_mm = 2");
}

TEST_CASE("a programme has pairs with rising times, and no rise time beside it") {
    CHECK(override_message("supply.programme=0:0 5:1 5:1.1") ==
          "--set supply.programme=0:0 5:1 5:1.1: supply.programme: the time of \"5:1.1\" does not rise; "
          "allowed: strictly rising times");
    CHECK(override_message("supply.programme=0") ==
          "--set supply.programme=0: supply.programme: \"0\" is not a pair; "
          "allowed: pairs time_ns:share such as 0:0 5:1");
    CHECK(override_message("supply.programme=0:3") ==
          "--set supply.programme=0:3: supply.programme: 3 is out of range; allowed: 0..2");
    CHECK(message_of(kSmallDeck, {"supply.programme=0:1", "supply.rise_time_ns=3"}) ==
          "--set supply.programme=0:1: supply.programme: given beside rise_time_ns; "
          "allowed: programme or rise_time_ns, not both");
}

TEST_CASE("modes fit the vanes") {
    CHECK(override_message("circuit.mode_numbers=3 6") ==
          "--set circuit.mode_numbers=3 6: circuit.mode_numbers: mode 6 of 10 vanes; allowed: mode numbers 1..5");
    CHECK(override_message("circuit.mode_numbers=0 5") ==
          "--set circuit.mode_numbers=0 5: circuit.mode_numbers: mode 0 of 10 vanes; allowed: mode numbers 1..5");
    CHECK(override_message("circuit.mode_numbers=5 5") ==
          "--set circuit.mode_numbers=5 5: circuit.mode_numbers: mode 5 stands twice; allowed: each mode number once");
    CHECK(override_message("circuit.unloaded_Q=1 2 3") ==
          "--set circuit.unloaded_Q=1 2 3: circuit.unloaded_Q: 3 values for 2 modes; "
          "allowed: one value for each of mode_numbers, or one for all");
    CHECK(override_message("tube.vane_count=0") ==
          "tube.ini:11: circuit.source: a smooth bore has no resonators; allowed: none, or a vane_count of 4..60");
}

TEST_CASE("an odd block has no pi mode") {
    CHECK(override_message("tube.vane_count=9") ==
          "tube.ini:12: circuit.mode_numbers: an odd block of 9 vanes has no pi mode; allowed: mode numbers 1..4");
    CHECK(message_of(kSmallDeck + replaced(kCircuit, "3, 5", "3, 4"), {"tube.vane_count=9", "prime.voltage_V=5"}) ==
          "--set prime.voltage_V=5: prime.voltage_V: an odd block of 9 vanes has no pi mode; "
          "allowed: a prime.mode of 1..4");
}

TEST_CASE("only a mode of the table can be primed") {
    CHECK(message_of(kSmallDeck + kCircuit, {"prime.mode=4", "prime.voltage_V=5"}) ==
          "--set prime.voltage_V=5: prime.voltage_V: mode 4 is not in circuit.mode_numbers; "
          "allowed: 0 V, or one of the modes 3, 5");
    CHECK(override_message("prime.mode=6") ==
          "--set prime.mode=6: prime.mode: mode 6 of 10 vanes; allowed: mode numbers 1..5");
}

TEST_CASE("a generator wants a mode of the table, near its frequency, and a matched load") {
    const Deck deck = read_text(kSmallDeck + kCircuit, {"drive.available_power_W=10"});
    CHECK(deck.drive.mode == 5);
    CHECK(relative_error(deck.drive.frequency, 2.45e9) < kRounding);
    CHECK(deck.drive.power == 10);
    CHECK(relative_error(read_text(kSmallDeck, {"drive.frequency_GHz=2.5"}).drive.frequency, 2.5e9) < kRounding);
    CHECK(override_message("drive.mode=6") ==
          "--set drive.mode=6: drive.mode: mode 6 of 10 vanes; allowed: mode numbers 1..5");
    CHECK(message_of(kSmallDeck + kCircuit, {"drive.mode=4", "drive.available_power_W=5"}) ==
          "--set drive.available_power_W=5: drive.available_power_W: mode 4 is not in circuit.mode_numbers; "
          "allowed: 0 W, or one of the modes 3, 5");
    CHECK(message_of(kSmallDeck + kCircuit, {"load.vswr=1.5", "drive.available_power_W=5"}) ==
          "--set drive.available_power_W=5: drive.available_power_W: given beside load.vswr = 1.5; "
          "allowed: 0 W, or a matched load (load.vswr = 1)");
    CHECK(message_of(kSmallDeck + kCircuit, {"drive.frequency_GHz=3", "drive.available_power_W=5"}) ==
          "--set drive.frequency_GHz=3: drive.frequency_GHz: 3 GHz is far from mode 5 at 2.45 GHz; "
          "allowed: 1.96..2.94 GHz");
}

TEST_CASE("azimuthal cells are a multiple of the vanes, with the nearest named") {
    CHECK(override_message("grid.azimuthal_cells=123") ==
          "--set grid.azimuthal_cells=123: grid.azimuthal_cells: 123 is not a multiple of vane_count = 10; "
          "allowed: 120 or 130");
    CHECK(override_message("grid.azimuthal_cells=9").ends_with("allowed: 10"));
    CHECK(override_message("grid.azimuthal_cells=504").ends_with("allowed: 500"));
}

TEST_CASE("snapshot times rise") {
    CHECK(override_message("output.snapshot_times_ns=2 1") ==
          "--set output.snapshot_times_ns=2 1: output.snapshot_times_ns: 1 does not rise; "
          "allowed: strictly rising times, or none");
    CHECK(read_text(kSmallDeck, {"output.snapshot_times_ns=none"}).output.snapshot_times.empty());
}
