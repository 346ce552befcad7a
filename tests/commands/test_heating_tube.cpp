// SPDX-License-Identifier: MIT
// The heating tube as its deck says: it locks in the pi mode with one spoke for two vanes; without priming it skips; at
// a higher voltage it shifts to the neighbouring mode. Bound on the efficiency: A. M. Clogston in G. B. Collins (ed.),
// Microwave Magnetrons, MIT Radiation Laboratory Series 6 (1948), from memory.
#include <doctest/doctest.h>

#include <fstream>
#include <nlohmann/json.hpp>
#include <string>

#include "inputs/constants.hpp"
#include "tests/commands/command.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;
using Json = nlohmann::json;

namespace {

Json heating_run(const char* end_time_ns, Arguments more = {}) {
    const ScratchFolder folder;
    more.insert(more.end(), {"--threads", "1", "--quiet", "--set", std::string("clock.end_time_ns=") + end_time_ns});
    const Outcome outcome =
        spokewright::spokewright(run_of(SPOKEWRIGHT_SOURCE_DIR "/inputs/tubes/heating.ini", folder.file("out"), more));
    INFO(outcome.err);
    REQUIRE(outcome.status == 0);
    std::ifstream file(folder.file("out/summary.json"));
    return Json::parse(file);
}

bool has_event(const Json& summary, const char* kind, const Json& from, const Json& to) {
    for (const Json& event : summary.at("mode_events")) {
        if (event.at("kind") == kind && event.at("from") == from && event.at("to") == to) return true;
    }
    return false;
}

}  // namespace

TEST_CASE("the heating tube settles in the pi mode with five spokes and balanced books") {
    const Json summary = heating_run("160");
    CHECK(summary.at("status") == "settled");
    CHECK(summary.at("dominant_mode") == 5);
    CHECK(summary.at("spoke_count") == 5);
    CHECK(summary.at("mode_events").size() == 1);
    CHECK(has_event(summary, "mode start", nullptr, 5));
    CHECK(summary.at("warnings").empty());
    CHECK(summary.at("energy_imbalance") <= 0.005);
    CHECK(summary.at("charge_imbalance_C") == 0.0);

    // A spoke's electrons reach the anode with the drift energy e V_0 at least, V_0 = m (2 pi f r_a / n)^2 / 2 e.
    const double speed = 2 * kPi * 2.45e9 * 4.6e-3 / 5;  // m/s, of the pi mode's wave at the anode
    const double drift_voltage = kElectronMass * speed * speed / (2 * kElementaryCharge);
    const double efficiency = summary.at("electronic_efficiency").at("mean");
    CHECK(efficiency > 0.5);  // below half a crossed-field tube is no use: common practice, no source
    CHECK(efficiency < 1 - drift_voltage / 4150);
    const double total = summary.at("total_efficiency").at("mean");
    CHECK(total < efficiency);
    // Circuit efficiency of a steady state, Q_0 / (Q_0 + Q_ext); 1 % for what the resonators still store or release.
    CHECK(relative_error(total / efficiency, 1500.0 / 1667) < 0.01);
}

TEST_CASE("without priming the pi mode does not start within the run: a mode skip") {
    const Json summary = heating_run("40", {"--set", "prime.voltage_V=0"});
    CHECK(summary.at("status") == "no oscillation");
    CHECK(summary.at("dominant_mode").is_null());
    CHECK(summary.at("mode_events").size() == 1);
    CHECK(has_event(summary, "mode skip", nullptr, nullptr));
}

TEST_CASE("at 6300 V the tube starts in the pi mode and shifts to the mode below") {
    const Json summary = heating_run("40", {"--set", "supply.anode_voltage_V=6300"});
    CHECK(summary.at("dominant_mode") == 4);
    CHECK(summary.at("spoke_count") == 4);
    CHECK(has_event(summary, "mode start", nullptr, 5));
    CHECK(has_event(summary, "mode shift", 5, 4));
}
