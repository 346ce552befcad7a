// SPDX-License-Identifier: MIT
#include "diagnostics/chart_sweep.hpp"

#include <doctest/doctest.h>

#include <string>

#include "tests/unit/small_deck.hpp"

using namespace spokewright;

namespace {

std::string fault_of(const std::string& text) {
    try {
        read_chart_sweep(text);
    } catch (const InputError& error) {
        return error.what();
    }
    return "no error";
}

std::string csv_fault(const std::vector<std::string>& overrides, const std::string& sweep) {
    const ScratchFolder folder;
    try {
        chart_csv(folder.write("tube.ini", kSmallDeck), overrides, read_chart_sweep(sweep));
    } catch (const InputError& error) {
        return error.what();
    }
    return "no error";
}

}  // namespace

TEST_CASE("a sweep: both ends exactly, even steps between, also downwards") {
    const ChartSweep sweep = read_chart_sweep("magnet.field_T=0.3:0.1:3");
    CHECK(sweep.key == "magnet.field_T");
    CHECK(sweep.value(0) == 0.3);
    CHECK(sweep.value(3) == 0.1);
    CHECK(sweep.value(1) < 0.2334);
    CHECK(sweep.value(1) > 0.2333);
}

TEST_CASE("sweeps that are none") {
    for (const char* text : {"x", "=1:2:3", "magnet.field_T", "magnet.field_T=1", "magnet.field_T=1:2"}) {
        CHECK(fault_of(text) == "--sweep " + std::string(text) + ": not a sweep; allowed: section.key=from:to:steps");
    }
    CHECK(fault_of("magnet.feld_T=1:2:3") ==
          "--sweep magnet.feld_T=1:2:3: magnet.feld_T: unknown key; the nearest known key is magnet.field_T");
    CHECK(fault_of("magnet=1:2:3") == "--sweep magnet=1:2:3: magnet: unknown key; the nearest known key is tube.name");
    CHECK(fault_of("tube.name=1:2:3") ==
          "--sweep tube.name=1:2:3: tube.name takes no number; allowed: a key with a number");
    CHECK(fault_of("magnet.field_T=a:2:3") ==
          "--sweep magnet.field_T=a:2:3: \"a\" is not a number; allowed: -1e+12..1e+12");
    CHECK(fault_of("magnet.field_T=1:nan:3") ==
          "--sweep magnet.field_T=1:nan:3: nan is out of range; allowed: -1e+12..1e+12");
    CHECK(fault_of("magnet.field_T=1:2:0") ==
          "--sweep magnet.field_T=1:2:0: 0 is out of range; allowed: a whole number, 1..10000");
    CHECK(fault_of("magnet.field_T=1:2:3:4") ==
          "--sweep magnet.field_T=1:2:3:4: \"3:4\" is not a whole number; allowed: a whole number, 1..10000");
    CHECK(fault_of("magnet.field_T=1:1:3") ==
          "--sweep magnet.field_T=1:1:3: goes nowhere; allowed: two different ends");
}

TEST_CASE("values that the deck refuses name the sweep") {
    CHECK(csv_fault({}, "magnet.field_T=9:11:2") ==
          "--sweep magnet.field_T=11: magnet.field_T: 11 is out of range; allowed: 0..10 T");
    CHECK(csv_fault({"magnet.field_T=0.2"}, "magnet.field_T=0.1:0.3:2") ==
          "--sweep magnet.field_T=0.1: magnet.field_T: given twice; allowed: once (first at --set magnet.field_T=0.2)");
    CHECK(csv_fault({"magnet.field_T=20"}, "supply.anode_voltage_V=1:2:1") ==
          "--set magnet.field_T=20: magnet.field_T: 20 is out of range; allowed: 0..10 T");
}

TEST_CASE("whole numbers are swept as such, unknown numbers are empty") {
    const ScratchFolder folder;
    const std::string csv =
        chart_csv(folder.write("tube.ini", kSmallDeck), {}, read_chart_sweep("tube.vane_count=4:8:2"));
    CHECK(csv.starts_with("tube.vane_count,cyclotron_frequency_GHz,hull_voltage_V,hull_field_mT,hub_radius_mm,"));
    CHECK(csv.find("\n6,4.898685") != std::string::npos);
    CHECK(csv.find(",,,") != std::string::npos);  // no circuit
    CHECK(csv.find("nan") == std::string::npos);
}
