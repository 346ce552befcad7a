// SPDX-License-Identifier: MIT
#include <doctest/doctest.h>

#include <algorithm>
#include <nlohmann/json.hpp>
#include <string>
#include <vector>

#include "diagnostics/summary_text.hpp"

using namespace spokewright;

namespace {

Summary example() {
    Summary s;
    s.version = "0.1.0";
    s.deck_sha256 = "ab";
    s.seed = 7;
    s.status = "settled";
    s.settled_from_ns = s.averaged_from_ns = 62.4;
    s.averaged_to_ns = s.end_time_ns = 200;
    s.anode_voltage_V = {4200, 0};
    s.anode_current_A = {1.651, 0.012};
    s.emitted_current_A = {6.2, 0.1};
    s.cathode_return_current_A = {4.55, 0.1};
    s.input_power_W = {6934, 50};
    s.rf_power_W = {5310, 40};
    s.load_power_W = {4800, 40};
    s.wall_loss_W = {510, 4};
    s.anode_heat_W = {1290, 10};
    s.cathode_heat_W = {330, 5};
    s.electronic_efficiency = {0.766, 0.004};
    s.total_efficiency = {0.692, 0.004};
    s.dominant_mode = 5;
    s.pi_mode = true;
    s.spoke_count = 5;
    s.spoke_strength = {0.43, 0.01};
    s.hub_radius_mm = {2.514, 0.01};
    s.frequency_GHz = {2.44913, 0.00002};
    s.frequency_shift_MHz = {-0.87, 0.02};
    s.modes = {{5, 2.45, 4022, {1890, 8}, {0, 0}, {1.8e-5, 1e-7}}};
    s.mode_events = {{14.2, "mode start", 0, 5}};
    s.energy_imbalance = 0.0021;
    s.hull_voltage_V = 9610;
    s.hartree_voltage_V = 4022;
    s.electrons = 21034;
    s.steps = 100000;
    s.wall_clock_s = 41.3;
    s.ns_per_electron_step = 3.21;
    s.hottest_vane = 3;
    s.hottest_vane_share = 0.104;
    return s;
}

}  // namespace

TEST_CASE("an efficiency known to under 0.1 % shows two decimals") {
    Summary s;
    s.electronic_efficiency = {0.5379, 0.0004};
    s.total_efficiency = {0.4841, 0.002};
    const std::vector<std::string> lines = summary_lines(s);
    CHECK(lines[4] == "efficiency   53.79 +/- 0.04 % electronic, 48.4 +/- 0.2 % in total");
}

TEST_CASE("the lines, word by word") {
    const std::vector<std::string> expected = {
        "status       settled; means from 62.4 to 200.0 ns of 200.0 ns",
        "current      1.65 A (+/- 0.73 %) at 4.2 kV",
        "input        6.93 kW (+/- 0.72 %)",
        "power        5.31 kW (+/- 0.75 %) from the electrons: 4.8 kW to the load, 510 W to the walls",
        "efficiency   76.6 +/- 0.4 % electronic, 69.2 +/- 0.4 % in total",
        "mode         5 (the pi mode), vane voltage 1.89 kV (+/- 0.42 %)",
        "spokes       5, bunching 0.43 of 1; hub radius 2.51 mm",
        "frequency    2.44913 GHz, -0.87 MHz from the cold mode",
        "heat         anode 1.29 kW (+/- 0.78 %), cathode 330 W (+/- 1.5 %); vane 3 takes 10.4 %",
        "cathode      emits 6.2 A, takes back 4.55 A",
        "thresholds   Hull 9.61 kV, Hartree 4.02 kV (mode 5)",
        "balance      energy open by 0.21 % of the input, charge by 0 C",
        "run          100000 steps, 21034 macro-electrons at the end, 41.3 s, 3.21 ns per electron and step",
        "event        mode start at 14.2 ns, none to mode 5",
        "A simulation, never a clearance: local codes and licensed practice decide what may be switched on."};
    CHECK(summary_lines(example()) == expected);
}

TEST_CASE("never more than 25 lines of 100 characters, and the rest is pointed to") {
    Summary s = example();
    for (int k = 0; k < 60; ++k) {
        s.warnings.push_back("a warning of some length that must be broken into lines: " + std::string(40 + k, 'x') +
                             " and so on and on until it fills more than one line of the terminal");
        s.mode_events.push_back({20.0 + k, "mode shift", 5, 4});
    }
    const auto lines = summary_lines(s);
    CHECK(lines.size() <= 25);
    CHECK(lines.size() > 20);
    for (const std::string& line : lines) CHECK(line.size() <= 100);
    const auto said = [&](const std::string& words) {
        return std::any_of(lines.begin(), lines.end(), [&](const std::string& line) { return line.ends_with(words); });
    };
    CHECK(said("58 more in summary.json"));  // events: three lines shown of 61
    CHECK(lines.back().starts_with("A simulation"));
}

TEST_CASE("summary.json has its keys in order, means with half-widths, null for the undefined") {
    const auto json = summary_json(example());
    std::vector<std::string> keys;
    for (const auto& item : json.items()) keys.push_back(item.key());
    const std::vector<std::string> expected = {"program",
                                               "version",
                                               "deck_sha256",
                                               "seed",
                                               "status",
                                               "settled_from_ns",
                                               "averaged_from_ns",
                                               "averaged_to_ns",
                                               "end_time_ns",
                                               "early_end",
                                               "anode_voltage_V",
                                               "anode_current_A",
                                               "emitted_current_A",
                                               "cathode_return_current_A",
                                               "input_power_W",
                                               "rf_power_W",
                                               "load_power_W",
                                               "wall_loss_W",
                                               "anode_heat_W",
                                               "cathode_heat_W",
                                               "electronic_efficiency",
                                               "total_efficiency",
                                               "dominant_mode",
                                               "spoke_count",
                                               "spoke_strength",
                                               "hub_radius_mm",
                                               "frequency_GHz",
                                               "frequency_shift_MHz",
                                               "drive_power_W",
                                               "drive_frequency_GHz",
                                               "locked",
                                               "modes",
                                               "mode_events",
                                               "energy_imbalance",
                                               "charge_imbalance_C",
                                               "hull_voltage_V",
                                               "hartree_voltage_V",
                                               "electrons",
                                               "steps",
                                               "wall_clock_s",
                                               "ns_per_electron_step",
                                               "warnings",
                                               "safety"};
    CHECK(keys == expected);
    CHECK(json["anode_current_A"].dump() == "{\"mean\":1.651,\"ci95\":0.012}");
    CHECK(json["mode_events"][0].dump() == "{\"time_ns\":14.2,\"kind\":\"mode start\",\"from\":null,\"to\":5}");
    CHECK(json["warnings"].is_array());
    CHECK(json["warnings"].empty());

    Summary s = example();
    s.dominant_mode = s.spoke_count = 0;
    s.frequency_GHz = s.spoke_strength = kUndefinedMean;
    s.settled_from_ns = kUndefined;
    s.anode_current_A.half_width = std::numeric_limits<double>::infinity();
    const auto bare = summary_json(s);
    CHECK(bare["dominant_mode"].is_null());
    CHECK(bare["spoke_count"].is_null());
    CHECK(bare["frequency_GHz"].is_null());
    CHECK(bare["settled_from_ns"].is_null());
    CHECK(bare["anode_current_A"].dump() == "{\"mean\":1.651,\"ci95\":null}");
}

TEST_CASE("the file's text parses again, whatever bytes a warning holds") {
    Summary s = example();
    s.warnings = {"bad \xff byte"};
    const std::string text = summary_file_text(s);
    CHECK(text.back() == '\n');
    CHECK(nlohmann::json::parse(text)["status"] == "settled");
}
