// SPDX-License-Identifier: MIT
// What a run leaves and prints: labelled datasets, the keys of summary.json, a summary that fits a terminal, and the
// same result whatever the number of threads.
#include <doctest/doctest.h>

#include <cstring>
#include <fstream>
#include <nlohmann/json.hpp>
#include <sstream>
#include <string>

#include "diagnostics/hdf5_file.hpp"
#include "tests/commands/command.hpp"
#include "tests/commands/quick_tube.hpp"

using namespace spokewright;

namespace {

const Arguments kSummaryKeys = {"program",
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

nlohmann::ordered_json summary_in(const std::string& folder) {
    std::ifstream file(folder + "/summary.json");
    return nlohmann::ordered_json::parse(file);
}

/// Paths of all datasets under a group. A group lists its members, a dataset has a unit.
Arguments datasets(const Hdf5File& file, const std::string& group) {
    Arguments paths;
    for (const std::string& name : file.list(group)) {
        const std::string path = group + (group == "/" ? "" : "/") + name;
        const Arguments below = datasets(file, path);
        if (below.empty()) paths.push_back(path);
        paths.insert(paths.end(), below.begin(), below.end());
    }
    return paths;
}

Arguments lines_of(const std::string& text) {
    Arguments lines;
    std::istringstream in(text);
    for (std::string line; std::getline(in, line);) lines.push_back(line);
    return lines;
}

/// Every number of the series and of the state, bit for bit.
std::string bytes_of_result(const std::string& folder) {
    std::string bytes;
    const auto append = [&](const auto& values) {
        bytes.append(reinterpret_cast<const char*>(values.data()), values.size() * sizeof(values[0]));
    };
    const Hdf5File run = Hdf5File::open(folder + "/run.h5");
    for (const std::string& name : run.list("/series")) append(run.read<double>("/series/" + name));
    const Hdf5File state = Hdf5File::open(folder + "/state.h5");
    for (const char* name : {"/electrons/r", "/electrons/theta"}) append(state.read<std::int32_t>(name));
    for (const char* name : {"/electrons/u_r", "/electrons/u_theta"}) append(state.read<float>(name));
    for (const char* group : {"/circuit", "/series"}) {
        for (const std::string& name : state.list(group)) {
            append(state.read<double>(std::string(group) + "/" + name));
        }
    }
    return bytes;
}

std::string result_with(const ScratchFolder& folder, const char* name, Arguments more) {
    more.push_back("--quiet");
    const std::string deck = folder.write("tube.ini", kQuickTube);
    REQUIRE(spokewright::spokewright(run_of(deck, folder.file(name), more)).status == 0);
    return bytes_of_result(folder.file(name));
}

}  // namespace

TEST_CASE("every dataset of run.h5 and state.h5 says its unit and what it is") {
    const ScratchFolder folder;
    result_with(folder, "out", {"--set", "output.snapshot_times_ns=1"});
    for (const char* name : {"out/run.h5", "out/state.h5"}) {
        const Hdf5File file = Hdf5File::open(folder.file(name));
        const Arguments paths = datasets(file, "/");
        CHECK(paths.size() > 40);
        for (const std::string& path : paths) {
            CAPTURE(path);
            CHECK(file.label(path).unit != "");
            CHECK(file.label(path).description != "");
        }
    }
    const Hdf5File run = Hdf5File::open(folder.file("out/run.h5"));
    CHECK(run.list("/") ==
          Arguments{"series", "spectra", "axes", "snapshots", "walls", "ledger", "deck", "provenance"});
    CHECK(run.list("/snapshots") == Arguments{"0", "1"});  // at 1 ns and at the end
    CHECK(run.read_text("/deck/text") == kQuickTube);
    CHECK(run.read_texts("/deck/overrides") == Arguments{"output.snapshot_times_ns=1"});
}

TEST_CASE("summary.json has its keys in their order") {
    const ScratchFolder folder;
    result_with(folder, "out", {});
    const nlohmann::ordered_json summary = summary_in(folder.file("out"));
    Arguments keys;
    for (const auto& [key, value] : summary.items()) keys.push_back(key);
    CHECK(keys == kSummaryKeys);
    CHECK(summary.at("program") == "spokewright");
    CHECK(summary.at("anode_current_A").contains("mean"));
    CHECK(summary.at("anode_current_A").contains("ci95"));
    CHECK(summary.at("charge_imbalance_C") == 0.0);
    CHECK(summary.at("steps") == 616);  // 2 ns of 3.249 ps, rounded up
    const std::string safety = summary.at("safety");
    for (const char* danger : {"never a clearance", "voltage", "microwave", "X-rays", "magnets", "beryllia", "local"}) {
        CAPTURE(danger);
        CHECK(safety.find(danger) != std::string::npos);
    }
}

TEST_CASE("the summary fits 25 lines of 100 columns, whatever there is to warn of") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    const Outcome plain = spokewright::spokewright(run_of(deck, folder.file("plain")));
    const Outcome full = spokewright::spokewright(
        run_of(deck, folder.file("full"),
               {"--set", "clock.sample_every=400", "--set", "grid.radial_cells=28", "--set", "grid.azimuthal_cells=50",
                "--set", "electrons.target_count=500", "--set", "cathode.emission_limit_A_per_cm2=0.1", "--set",
                "supply.anode_voltage_V=4000"}));
    CHECK(summary_in(folder.file("full")).at("warnings").size() >= 5);
    CHECK(full.out.find("more in summary.json") != std::string::npos);
    for (const Outcome& outcome : {plain, full}) {
        REQUIRE(outcome.status == 0);
        const Arguments lines = lines_of(outcome.out);
        CHECK(lines.size() <= 25);
        for (const std::string& line : lines) {
            CAPTURE(line);
            CHECK(line.size() <= 100);
        }
        CHECK(lines.at(0).find("status ") == 0);
        CHECK(lines.at(1).find("current ") == 0);
        CHECK(lines.back().find("A simulation, never a clearance") == 0);
    }
}

TEST_CASE("standard error that is no terminal gets plain lines, one each tenth of the way") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    const Outcome outcome = spokewright::spokewright(run_of(deck, folder.file("out")));
    CHECK(outcome.err.find('\r') == std::string::npos);
    CHECK(outcome.err.find('\x1b') == std::string::npos);
    const Arguments lines = lines_of(outcome.err);
    CHECK(lines.size() == 10);
    CHECK(lines.back().find("100 %  2.0 of 2.0 ns  ") == 0);
}

TEST_CASE("--quiet prints nothing") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    const Outcome outcome = spokewright::spokewright(run_of(deck, folder.file("out"), {"--quiet"}));
    CHECK(outcome.status == 0);
    CHECK(outcome.out == "");
    CHECK(outcome.err == "");
}

TEST_CASE("threads do not change a bit, a seed does") {
    const ScratchFolder folder;
    const std::string one = result_with(folder, "one", {"--threads", "1"});
    CHECK(result_with(folder, "again", {"--threads", "1"}) == one);
    CHECK(result_with(folder, "two", {"--threads", "2"}) == one);
    CHECK(result_with(folder, "three", {"--threads", "3"}) == one);  // more than the processors of a small machine
    CHECK(result_with(folder, "seed", {"--set", "electrons.seed=2"}) != one);
}

TEST_CASE("--set wins over the deck, and the resolved deck makes the same run") {
    const ScratchFolder folder;
    const std::string changed = result_with(folder, "out", {"--set", "magnet.field_T=0.18"});
    const Hdf5File run = Hdf5File::open(folder.file("out/run.h5"));
    const std::string resolved = run.read_text("/deck/resolved");
    CHECK(resolved.find("\nfield_T = 0.18\n") != std::string::npos);
    CHECK(run.read_texts("/deck/overrides") == Arguments{"magnet.field_T=0.18"});
    CHECK(run.read_text("/deck/text") == kQuickTube);
    CHECK(changed != result_with(folder, "plain", {}));

    const std::string deck = folder.write("resolved.ini", resolved);
    REQUIRE(spokewright::spokewright(run_of(deck, folder.file("anew"), {"--quiet"})).status == 0);
    CHECK(bytes_of_result(folder.file("anew")) == changed);
}

TEST_CASE("--replace puts a new result in the place of the old one") {
    const ScratchFolder folder;
    const std::string first = result_with(folder, "out", {});
    CHECK(result_with(folder, "out", {"--replace", "--set", "electrons.seed=2"}) != first);
    CHECK(summary_in(folder.file("out")).at("seed") == 2);
    CHECK(names_in(folder.file("out")) == Arguments{"run.h5", "state.h5", "summary.json"});
}

TEST_CASE("version, help and keys") {
    const auto printed = [](const Arguments& arguments) {
        const Outcome outcome = spokewright::spokewright(arguments);
        CHECK(outcome.status == 0);
        CHECK(outcome.err == "");
        return outcome.out;
    };
    const ScratchFolder folder;
    result_with(folder, "out", {});
    const std::string version = summary_in(folder.file("out")).at("version");
    CHECK(version.find_first_not_of("0123456789.") == std::string::npos);
    CHECK(printed({"--version"}) == "spokewright " + version + "\n");
    CHECK(printed({"--help"}).find("  spokewright run DECK --out DIR [--set section.key=value ...]") !=
          std::string::npos);
    CHECK(printed({"-h"}) == printed({"--help"}));
    for (const char* option : {"--out", "--set", "--threads", "--resume", "--replace", "--quiet"}) {
        CAPTURE(option);
        CHECK(printed({"run", "--help"}).find(std::string("  ") + option) != std::string::npos);
    }
    CHECK(printed({"keys", "--help"}).find("  --markdown") != std::string::npos);

    const std::string keys = printed({"keys"});
    CHECK(keys.find("[tube]\n  name\n") == 0);
    CHECK(
        keys.find("\n  anode_voltage_V\n      Nominal anode voltage; the programme scales it.\n      unit V; allowed: "
                  "above 0 to 1e+06 V; default: required\n") != std::string::npos);
    const Arguments rows = lines_of(printed({"keys", "--markdown"}));
    CHECK(rows.at(0) == "| key | unit | allowed | default | meaning |");
    CHECK(rows.at(1) == "|---|---|---|---|---|");
    for (const std::string& row : rows) {
        CAPTURE(row);
        CHECK(std::count(row.begin(), row.end(), '|') == 6);
    }
}
