// SPDX-License-Identifier: MIT
// spokewright chart as a user runs it: the tubes that come with it, JSON, sweeps, and what it refuses.
#include <doctest/doctest.h>

#include <algorithm>
#include <fstream>
#include <iterator>
#include <nlohmann/json.hpp>
#include <sstream>
#include <string>

#include "tests/commands/command.hpp"
#include "tests/commands/quick_tube.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

const std::string kTubes = SPOKEWRIGHT_SOURCE_DIR "/inputs/tubes/";
const std::string kUsage =
    "usage: spokewright chart DECK [--set section.key=value ...] [--json | --sweep section.key=from:to:steps]\n";

nlohmann::json chart_of(const std::string& tube) {
    const Outcome outcome = spokewright::spokewright({"chart", kTubes + tube, "--json"});
    CHECK(outcome.status == 0);
    CHECK(outcome.err == "");
    return nlohmann::json::parse(outcome.out);
}

double value(const nlohmann::json& chart, const char* key) {
    return chart.at("rows").at(key).at("value");
}

/// Exit status 2, nothing on standard output, this on standard error.
void refused(const Arguments& arguments, const std::string& message, int status = 2) {
    const Outcome outcome = spokewright::spokewright(arguments);
    CHECK(outcome.status == status);
    CHECK(outcome.out == "");
    CHECK(outcome.err == message);
}

}  // namespace

TEST_CASE("the three tubes, by what their decks say of themselves") {
    const auto heating = chart_of("heating.ini");
    CHECK(relative_error(value(heating, "hartree_voltage_V"), 4050) < 2e-3);  // "about 4.05 kV"
    CHECK(relative_error(value(heating, "hull_voltage_V"), 9300) < 5e-3);
    CHECK(relative_error(value(heating, "loaded_Q"), 150) < 4e-3);  // "Loaded Q of the pi mode: 150"
    const auto pulsed = chart_of("pulsed.ini");
    CHECK(relative_error(value(pulsed, "hartree_voltage_V"), 20400) < 3e-3);  // "about 20.4 kV"
    CHECK(relative_error(value(pulsed, "loaded_Q"), 105) < 5e-3);
    const auto diode = chart_of("diode.ini");
    CHECK(relative_error(value(diode, "hull_field_mT"), 116.7) < 5e-4);  // "about 0.1167 T"
    CHECK(diode.at("rows").at("hartree_voltage_V").at("value").is_null());
    CHECK(diode.at("rows").at("hartree_voltage_V").at("note") == "no modes: tube.vane_count = 0");
    CHECK(diode.at("waves").empty());
}

TEST_CASE("the table of each tube, and the README shows that of the heating tube") {
    for (const char* tube : {"heating.ini", "pulsed.ini", "diode.ini"}) {
        const Outcome outcome = spokewright::spokewright({"chart", kTubes + tube});
        CHECK(outcome.status == 0);
        CHECK(outcome.err == "");
        CHECK(outcome.out.starts_with("Operating chart of Quillmere "));
        CHECK(outcome.out.find("Hull voltage") != std::string::npos);
    }
    std::ifstream file(SPOKEWRIGHT_SOURCE_DIR "/README.md");
    const std::string readme{std::istreambuf_iterator<char>(file), {}};
    const Outcome heating = spokewright::spokewright({"chart", kTubes + "heating.ini"});
    std::istringstream lines(without(heating.out, SPOKEWRIGHT_SOURCE_DIR "/"));
    std::string indented;
    for (std::string line; std::getline(lines, line);) indented += (line.empty() ? "" : "    " + line) + "\n";
    CHECK(readme.find("<!-- chart -->\n\n" + indented + "\n<!-- /chart -->") != std::string::npos);
}

TEST_CASE("--set wins over the deck") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    const Outcome outcome = spokewright::spokewright({"chart", deck, "--json", "--set", "supply.anode_voltage_V=5000"});
    CHECK(value(nlohmann::json::parse(outcome.out), "anode_voltage_V") == 5000);
}

TEST_CASE("a sweep is CSV with units in its header, its rows those of the chart") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    const Outcome outcome = spokewright::spokewright({"chart", deck, "--sweep", "supply.anode_voltage_V=4000:4300:2"});
    CHECK(outcome.status == 0);
    CHECK(outcome.err == "");
    std::istringstream lines(outcome.out);
    std::string header, row;
    std::getline(lines, header);
    CHECK(header.starts_with("supply.anode_voltage_V,cyclotron_frequency_GHz,hull_voltage_V,"));
    const auto commas = std::ranges::count(header, ',');
    for (const char* first : {"4000,", "4150,", "4300,"}) {
        REQUIRE(std::getline(lines, row));
        CHECK(row.starts_with(first));
        CHECK(std::ranges::count(row, ',') == commas);
        const Outcome one = spokewright::spokewright(
            {"chart", deck, "--json", "--set", "supply.anode_voltage_V=" + row.substr(0, row.find(','))});
        const auto chart = nlohmann::json::parse(one.out);
        std::istringstream names(header), fields(row);
        std::string name, field;
        std::getline(names, name, ',');
        std::getline(fields, field, ',');
        while (std::getline(names, name, ',')) {
            std::getline(fields, field, ',');
            CAPTURE(name);
            const auto& number = chart.at("rows").at(name).at("value");
            CHECK(number.is_null() == field.empty());
            if (!field.empty()) CHECK(number == std::stod(field));
        }
    }
    CHECK_FALSE(std::getline(lines, row));
}

TEST_CASE("what it refuses") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    refused({"chart"}, "chart: DECK is missing; " + kUsage);
    refused({"chart", deck, "--out", "x"}, "chart: unrecognised option '--out'; " + kUsage);
    refused({"chart", deck, "--sweep"}, "chart: the required argument for option '--sweep' is missing; " + kUsage);
    refused({"chart", deck, "--json", "--sweep", "magnet.field_T=0.1:0.2:2"},
            "chart: --json and --sweep exclude each other; give one of them\n");
    refused({"chart", deck, "--sweep", "magnet.field_T"},
            "--sweep magnet.field_T: not a sweep; allowed: section.key=from:to:steps\n");
    refused({"chart", deck, "--sweep", "magnet.feld_T=0.1:0.2:2"},
            "--sweep magnet.feld_T=0.1:0.2:2: magnet.feld_T: unknown key; the nearest known key is magnet.field_T\n");
    // The fault is in the last row: the good rows must not be printed either.
    refused({"chart", deck, "--sweep", "magnet.field_T=9:11:2"},
            "--sweep magnet.field_T=11: magnet.field_T: 11 is out of range; allowed: 0..10 T\n");
    refused({"chart", deck, "--set", "magnet.field_T=11"},
            "--set magnet.field_T=11: magnet.field_T: 11 is out of range; allowed: 0..10 T\n");
    refused({"chart", folder.file("gone.ini")},
            folder.file("gone.ini") + ": cannot be read: No such file or directory\n", 4);
    const std::string bad = folder.write("bad.ini", quick_tube_with("= 4150", "= 4.15 kV"));
    refused({"chart", bad, "--json"},
            bad + ":7: supply.anode_voltage_V: \"4.15 kV\" is not a number; allowed: above 0 to 1e+06 V\n");
}

TEST_CASE("--help names the options") {
    const Outcome help = spokewright::spokewright({"chart", "--help"});
    CHECK(help.status == 0);
    CHECK(help.out.starts_with(kUsage));
    for (const char* option : {"--set", "--json", "--sweep"}) CHECK(help.out.find(option) != std::string::npos);
}
