// SPDX-License-Identifier: MIT
// The deck reader: values in SI units, the resolved deck, and the exact message for every kind of mistake.
#include "inputs/deck_reader.hpp"

#include <doctest/doctest.h>

#include <string>
#include <vector>

#include "inputs/constants.hpp"
#include "inputs/errors.hpp"
#include "tests/relative_error.hpp"
#include "tests/scratch_folder.hpp"
#include "tests/unit/small_deck.hpp"

using namespace spokewright;

TEST_CASE("a deck is read in SI units") {
    const Deck deck = read_text(kSmallDeck);
    CHECK(relative_error(deck.tube.cathode_radius, 2e-3) < kRounding);
    CHECK(relative_error(deck.tube.anode_radius, 4.6e-3) < kRounding);
    CHECK(relative_error(deck.tube.axial_height, 1e-2) < kRounding);
    CHECK(deck.tube.vane_count == 10);
    CHECK(deck.supply.anode_voltage == 4150);
    CHECK(deck.magnet.field == 0.175);
    CHECK(deck.circuit.modes.empty());
}

TEST_CASE("every unit factor of the optional keys") {
    const Deck deck = read_text(
        kSmallDeck,
        {"supply.shunt_capacitance_pF=7", "cathode.richardson_A_per_cm2_K2=60", "cathode.emission_limit_A_per_cm2=5",
         "load.phase_deg=90", "drive.phase_deg=45", "drive.start_ns=3", "clock.step_ps=1.5", "clock.end_time_ns=30",
         "output.checkpoint_minutes=2", "output.snapshot_times_ns=1, 2 3", "supply.programme=0:0.5,10:1 20:0"});
    CHECK(relative_error(deck.supply.shunt_capacitance, 7e-12) < kRounding);
    CHECK(relative_error(deck.cathode.richardson_constant, 60e4) < kRounding);
    CHECK(relative_error(deck.cathode.emission_limit, 5e4) < kRounding);
    CHECK(relative_error(deck.load.phase, kPi / 2) < kRounding);
    CHECK(relative_error(deck.clock.step, 1.5e-12) < kRounding);
    CHECK(relative_error(deck.clock.end_time, 30e-9) < kRounding);
    CHECK(deck.output.checkpoint_interval == 120);
    CHECK(relative_error(deck.drive.phase, kPi / 4) < kRounding);
    CHECK(relative_error(deck.drive.start, 3e-9) < kRounding);
    REQUIRE(deck.output.snapshot_times.size() == 3);
    CHECK(relative_error(deck.output.snapshot_times[2], 3e-9) < kRounding);
    REQUIRE(deck.supply.programme.size() == 3);
    CHECK(deck.supply.programme[0].share == 0.5);
    CHECK(relative_error(deck.supply.programme[1].time, 10e-9) < kRounding);
}

TEST_CASE("the resolved deck reads back as the same deck") {
    for (const std::string& text : {kSmallDeck, kSmallDeck + kCircuit}) {
        const Deck first = read_text(text);
        const Deck second = read_text(first.resolved_text);
        CHECK(second.resolved_text == first.resolved_text);
        CHECK(second.clock.step == first.clock.step);
        CHECK(second.cathode.launch_temperature == first.cathode.launch_temperature);
        CHECK(second.supply.programme[1].time == first.supply.programme[1].time);
    }
    CHECK(read_text(kSmallDeck).resolved_text.find("\ngap_share = 0.4\n") != std::string::npos);
}

TEST_CASE("the deck keeps its text and its overrides, and both enter the hash") {
    const Deck plain = read_text(kSmallDeck);
    const Deck changed = read_text(kSmallDeck, {"electrons.seed=2"});
    CHECK(plain.text == kSmallDeck);
    CHECK(changed.overrides == std::vector<std::string>{"electrons.seed=2"});
    CHECK(changed.electrons.seed == 2);
    CHECK(plain.sha256.size() == 64);
    CHECK(plain.sha256 != changed.sha256);
    CHECK(plain.sha256 == read_text(kSmallDeck).sha256);
}

TEST_CASE("CRLF ends, a byte order mark, comments in UTF-8 and a missing last newline are read") {
    std::string dos = "\xEF\xBB\xBF# B\xC3\xBChne\r\n";
    for (const char c : kSmallDeck) dos += c == '\n' ? "\r\n" : std::string(1, c);
    CHECK(read_text(dos).tube.vane_count == 10);
    CHECK(read_text(kSmallDeck.substr(0, kSmallDeck.size() - 1)).magnet.field == 0.175);
    CHECK(read_text(replaced(kSmallDeck, "= 10\n[supply]", "=10 # vanes\n[supply]")).tube.vane_count == 10);
}

TEST_CASE("unknown keys and sections name the nearest known one") {
    CHECK(message_of(replaced(kSmallDeck, "vane_count", "vane_cuont")) ==
          "tube.ini:5: tube.vane_cuont: unknown key; the nearest known key is tube.vane_count");
    CHECK(message_of(replaced(kSmallDeck, "[magnet]\n", "")) ==
          "tube.ini:8: supply.field_T: unknown key; the nearest known key is magnet.field_T");
    CHECK(message_of(replaced(kSmallDeck, "[supply]", "[suply]")) ==
          "tube.ini:6: [suply]: unknown section; the nearest known section is [supply]");
    CHECK(override_message("sample_evry=3") ==
          "--set sample_evry=3: sample_evry: unknown key; the nearest known key is clock.sample_every");
}

TEST_CASE("lines that are no settings") {
    CHECK(message_of("field_T = 1\n") ==
          "tube.ini:1: \"field_T = 1\": stands before any section; allowed: [section] first");
    CHECK(message_of("[tube]\n\nvanes ten\n") ==
          "tube.ini:3: \"vanes ten\": not a setting; allowed: [section] or key = value");
    CHECK(override_message("tube.vane_count") ==
          "--set tube.vane_count: not a setting; allowed: section.key=value on one line, without #");
    CHECK(override_message("tube.name=a#b") ==
          "--set tube.name=a#b: not a setting; allowed: section.key=value on one line, without #");
}

TEST_CASE("a key given twice is an error, an override of the file is not") {
    const ScratchFolder folder;
    const std::string path = folder.write("tube.ini", kSmallDeck + "field_T = 0.2\n");
    CHECK_THROWS_WITH_AS(read_deck(path, {}),
                         (path + ":10: magnet.field_T: given twice; allowed: once (first at " + path + ":9)").c_str(),
                         InputError);
    CHECK(message_of(kSmallDeck, {"magnet.field_T=1", "magnet.field_T=2"}) ==
          "--set magnet.field_T=2: magnet.field_T: given twice; allowed: once (first at --set magnet.field_T=1)");
    CHECK(read_text(kSmallDeck, {"magnet.field_T=0.2"}).magnet.field == 0.2);
}

TEST_CASE("missing keys") {
    CHECK(message_of("") == "tube.ini: tube.cathode_radius_mm: missing; allowed: above 0 to 1000 mm");
    CHECK(message_of(replaced(kSmallDeck, "field_T = 0.175\n", "")) ==
          "tube.ini: magnet.field_T: missing; allowed: field_T, 0..10 T, or field_table");
    CHECK(message_of(kSmallDeck + replaced(kCircuit, "external_Q = 167\n", "")) ==
          "tube.ini: circuit.external_Q: missing; needed with circuit.source = table: a value for each mode");
}

TEST_CASE("files that are not there") {
    CHECK_THROWS_WITH_AS(read_deck("no/such/tube.ini", {}),
                         "no/such/tube.ini: cannot be read: No such file or directory", FileError);
    const ScratchFolder folder;
    const std::string path = folder.path().string();
    CHECK_THROWS_WITH_AS(read_deck(path, {}), (path + ": cannot be read: Is a directory").c_str(), FileError);
}

TEST_CASE("every tube that comes with the program is read") {
    for (const char* name : {"heating", "pulsed", "diode"}) {
        CAPTURE(name);
        const std::string path = std::string(SPOKEWRIGHT_SOURCE_DIR "/inputs/tubes/") + name + ".ini";
        CHECK_NOTHROW(read_deck(path, {}));
    }
}
