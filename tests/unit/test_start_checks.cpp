// SPDX-License-Identifier: MIT
#include <doctest/doctest.h>

#include <functional>
#include <string>

#include "diagnostics/start_checks.hpp"
#include "tests/played_run.hpp"

using namespace spokewright;

namespace {

/// A deck that passes: the played tube on a finer grid.
Deck good_deck() {
    Deck deck = played_deck();
    deck.grid = {48, 160};
    return deck;
}

/// The finding that speaks of `words`, as "fatal: ..." or "warning: ...", and "" when there is none.
std::string finding(const Deck& deck, const std::string& words) {
    for (const Finding& found : start_checks(deck)) {
        if (found.text.find(words) != std::string::npos) return (found.fatal ? "fatal: " : "warning: ") + found.text;
    }
    return "";
}

}  // namespace

TEST_CASE("a good deck has no findings") {
    for (const Finding& found : start_checks(good_deck())) CHECK(found.text == "");
}

TEST_CASE("a step too long for the orbit, the plasma and the mode, with the step that would do") {
    Deck deck = good_deck();
    deck.clock.step = 12e-12;  // omega_c is 3.254e10 rad/s
    CHECK(finding(deck, "omega_c dt") ==
          "warning: omega_c dt is 0.39 (good up to 0.3, hopeless above 0.5): set clock.step_ps to at most 9.22");
    CHECK(finding(deck, "omega_p dt").starts_with("warning: omega_p dt is 0.39 in the hub at the cathode"));
    CHECK(finding(deck, "steps a period").starts_with("warning: mode 4 has 29.8 steps a period"));
    deck.clock.step = 16e-12;
    CHECK(finding(deck, "omega_c dt").starts_with("fatal: omega_c dt is 0.521"));
    deck.clock.step = 40e-12;
    CHECK(finding(deck, "steps a period").starts_with("fatal: mode 4 has 8.9 steps a period"));
}

TEST_CASE("a load whose susceptance is no small addition") {
    Deck deck = good_deck();
    deck.circuit.modes.resize(1);
    deck.circuit.modes[0].external_q = 10;
    // Reflection 2/3 at 90 degrees: y = (1 - j 2/3) / (1 + j 2/3) has the imaginary part -12/13.
    deck.load = {5, kPi / 2};
    CHECK(finding(deck, "the load moves") == "");  // 12/13 / 20 = 4.6 %
    deck.circuit.modes[0].external_q = 4;
    CHECK(finding(deck, "the load moves") ==
          "warning: the load moves mode " + std::to_string(deck.circuit.modes[0].number) +
              " by 12 % of its frequency (good up to 5 %, hopeless above 25 %): lower load.vswr or raise "
              "circuit.external_Q");
    deck.circuit.modes[0].external_q = 1;
    CHECK(finding(deck, "the load moves").starts_with("fatal: the load moves mode"));
}

TEST_CASE("the strongest field of a table sets the orbit") {
    Deck deck = good_deck();
    deck.magnet.table = {{1.9e-3, 0.5}, {2.2e-3, 0.15}, {4.5e-3, 0.15}};
    deck.magnet.field_scale = 1;
    deck.clock.step = 4e-12;
    CHECK(finding(deck, "omega_c dt").starts_with("warning: omega_c dt is 0.352"));
}

TEST_CASE("a hub too thin for the grid or too thinly populated") {
    Deck deck = good_deck();
    deck.grid.radial_cells = 24;
    CHECK(finding(deck, "radial cells thick").starts_with("warning: the hub is 5.4 radial cells thick"));
    deck.grid.radial_cells = 12;
    CHECK(finding(deck, "radial cells thick").starts_with("fatal: "));
    deck = good_deck();
    deck.electrons.target_count = 3000;
    CHECK(finding(deck, "macro-electrons a cell").starts_with("warning: the hub holds 1.7 macro-electrons a cell"));
    deck.electrons.target_count = 100;
    CHECK(finding(deck, "macro-electrons a cell").starts_with("fatal: "));
}

TEST_CASE("gaps and waves too coarse, with a number of cells that the deck accepts") {
    Deck deck = good_deck();
    deck.grid.azimuthal_cells = 80;
    CHECK(finding(deck, "a gap is") ==
          "warning: a gap is 3.2 azimuthal cells wide (good from 4, hopeless below 2): set "
          "grid.azimuthal_cells to at least 100");
    deck.grid.azimuthal_cells = 40;
    CHECK(finding(deck, "a gap is").starts_with("fatal: "));
    deck.grid.azimuthal_cells = 30;
    CHECK(finding(deck, "mode 5 has 6.0 azimuthal cells a wave").ends_with("set grid.azimuthal_cells to at least 40"));
}

TEST_CASE("a tube too large for static fields") {
    Deck deck = good_deck();
    deck.tube.anode_radius = 20e-3;
    deck.circuit.modes = {{5, 2.45e9, 1500, 150, 1e-12}};  // k r_a = 1.027, squared over 24: 4.4 %
    CHECK(finding(deck, "omega r_a / c") == "");
    deck.circuit.modes = {{2, 2.45e9, 1500, 150, 1e-12}};  // squared over 12: 8.8 %
    CHECK(finding(deck, "omega r_a / c")
              .starts_with("warning: omega r_a / c is 1.03 in mode 2: the static fields of "
                           "this model are off by about 9 % there"));
    deck.tube.anode_radius = 50e-3;  // 2.57 squared over 12: 55 %
    CHECK(finding(deck, "omega r_a / c").starts_with("fatal: "));
}

TEST_CASE("an electron may not leap over the grid") {
    Deck deck = good_deck();
    deck.grid.radial_cells = 120;  // 20.8 um; 3.75e7 m/s at 4.1 kV
    deck.clock.step = 2e-12;
    CHECK(finding(deck, "radial cells in a step").starts_with("warning: an electron at the full voltage crosses 3.7"));
    deck.clock.step = 4e-12;
    CHECK(finding(deck, "radial cells in a step").starts_with("fatal: "));
}

TEST_CASE("samples too rare to tell the frequency") {
    Deck deck = good_deck();
    deck.clock.sample_every = 4000;  // 8 ns
    CHECK(finding(deck, "samples tell frequencies of mode 5") ==
          "warning: the samples tell frequencies of mode 5 apart only within 62.5 MHz of the cold one (good from 122): "
          "set "
          "clock.sample_every to at most 2040");
}

TEST_CASE("voltages below Hartree and above Hull") {
    Deck deck = good_deck();
    deck.supply.anode_voltage = 3000;
    CHECK(finding(deck, "below the Hartree voltage of every mode").find("mode 5 4023 V") != std::string::npos);
    deck.circuit.modes[0].frequency = 1.2e9;  // a slow mode 4 with a low threshold
    CHECK(finding(deck, "below the Hartree voltage of the pi mode").starts_with("warning: "));
    deck.supply.anode_voltage = 12000;
    CHECK(finding(deck, "above the Hull voltage").starts_with("warning: the anode voltage 12000 V is above"));
    deck.magnet.field = 0;
    CHECK(finding(deck, "above the Hull voltage") == "");  // a diode on purpose
}

TEST_CASE("a diode without field is timed by the flight across its gap") {
    Deck deck = good_deck();
    deck.magnet.field = 0;
    deck.circuit.modes.clear();
    deck.grid.radial_cells = 24;
    deck.clock.step = 4e-12;
    CHECK(finding(deck, "crosses the gap in 16 steps").starts_with("warning: "));
    deck.clock.step = 10e-12;
    CHECK(finding(deck, "crosses the gap in 7 steps").starts_with("fatal: "));
    deck.clock.step = 1e-12;
    CHECK(start_checks(deck).empty());
}

TEST_CASE("a cathode too cold for the current the tube wants") {
    Deck deck = good_deck();
    deck.cathode.emission = EmissionLaw::thermionic;
    deck.cathode.richardson_constant = 3e4;
    deck.cathode.work_function = 2.63;
    deck.cathode.temperature = 2000;  // 2.831e4 A/m^2 on 1.164 cm^2
    CHECK(finding(deck, "the cathode can emit") == "");
    deck.cathode.temperature = 1600;
    CHECK(finding(deck, "the cathode can emit").find("raise cathode.temperature_K until it gives") !=
          std::string::npos);
    deck.cathode.secondary_emission = true;
    CHECK(finding(deck, "the cathode can emit") == "");
}
