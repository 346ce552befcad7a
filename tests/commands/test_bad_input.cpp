// SPDX-License-Identifier: MIT
// What a user does wrong: the exact message on standard error, exit status 2 or 4, and no file left behind.
#include <doctest/doctest.h>

#include <fstream>
#include <iterator>
#include <nlohmann/json.hpp>
#include <random>
#include <string>

#include "tests/commands/command.hpp"
#include "tests/commands/quick_tube.hpp"

using namespace spokewright;

namespace {

struct Refusal {
    int status;
    std::string message;
    bool operator==(const Refusal&) const = default;
};

std::ostream& operator<<(std::ostream& out, const Refusal& refusal) {
    return out << "status " << refusal.status << ", \"" << refusal.message << '"';
}

const std::string kRunUsage =
    "usage: spokewright run DECK --out DIR [--set section.key=value ...] [--threads n] [--resume | --replace] "
    "[--quiet]\n";

Refusal refusal(const Arguments& arguments, const ScratchFolder& folder) {
    const Outcome outcome = spokewright::spokewright(arguments);
    CHECK(outcome.out == "");
    return {outcome.status, without(outcome.err, folder.path().string() + "/")};
}

/// `run tube.ini --out out` of a deck of this text; nothing may be in `out` afterwards.
Refusal refusal_of_deck(const std::string& text, const Arguments& more = {}) {
    const ScratchFolder folder;
    const Refusal answer = refusal(run_of(folder.write("tube.ini", text), folder.file("out"), more), folder);
    CHECK(names_in(folder.file("out")).empty());
    CHECK(names_in(folder.path().string()).size() <= 2);  // the deck and perhaps the empty folder
    return answer;
}

Refusal refusal_with(const std::string& old_part, const std::string& new_part) {
    return refusal_of_deck(quick_tube_with(old_part, new_part));
}

Refusal refusal_of_setting(const std::string& setting) {
    return refusal_of_deck(kQuickTube, {"--set", setting});
}

Refusal refusal_of_table(const std::string& table) {
    const ScratchFolder folder;
    folder.write("field.txt", table);
    const std::string deck = folder.write("tube.ini", quick_tube_with("field_T = 0.175", "field_table = field.txt"));
    const Refusal answer = refusal(run_of(deck, folder.file("out")), folder);
    CHECK(names_in(folder.path().string()) == Arguments{"field.txt", "tube.ini"});
    return answer;
}

}  // namespace

TEST_CASE("the command line: verbs and options") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    const std::string out = folder.file("out");
    const auto refused = [&](const Arguments& arguments) { return refusal(arguments, folder); };
    CHECK(refused({}) == Refusal{2, "no verb; one of run, chart, keys, or --help\n"});
    CHECK(refused({"walk"}) == Refusal{2, "'walk' is no verb; one of run, chart, keys, or --help\n"});
    CHECK(refused({"run"}) == Refusal{2, "run: DECK is missing; " + kRunUsage});
    CHECK(refused({"run", "", "--out", out}) == Refusal{2, "run: DECK is missing; " + kRunUsage});
    CHECK(refused({"run", deck}) == Refusal{2, "run: --out is missing; " + kRunUsage});
    CHECK(refused({"run", deck, "--out", ""}) == Refusal{2, "run: --out is missing; " + kRunUsage});
    CHECK(refused({"run", deck, "--out"}) ==
          Refusal{2, "run: the required argument for option '--out' is missing; " + kRunUsage});
    CHECK(refused(run_of(deck, out, {deck})) ==
          Refusal{2, "run: too many positional options have been specified on the command line; " + kRunUsage});
    CHECK(refused(run_of(deck, out, {"--threads", "0"})) == Refusal{2, "run: --threads 0: out of range; 1 to 256\n"});
    CHECK(refused(run_of(deck, out, {"--threads", "two"})) ==
          Refusal{2, "run: the argument ('two') for option '--threads' is invalid; " + kRunUsage});
    CHECK(refused(run_of(deck, out, {"--resume", "--replace"})) ==
          Refusal{2, "run: --resume and --replace exclude each other; give one of them\n"});
    CHECK(refused({"keys", "--html"}) ==
          Refusal{2, "keys: unrecognised option '--html'; usage: spokewright keys [--markdown]\n"});
    CHECK(names_in(folder.path().string()) == Arguments{"tube.ini"});
}

TEST_CASE("abbreviated options are refused: a later option could change what they mean") {
    CHECK(refusal_of_deck(kQuickTube, {"--thr", "1"}) == Refusal{2, "run: unrecognised option '--thr'; " + kRunUsage});
    CHECK(refusal_of_deck(kQuickTube, {"--resum"}) == Refusal{2, "run: unrecognised option '--resum'; " + kRunUsage});
    CHECK(refusal_of_deck(kQuickTube, {"--rep"}) == Refusal{2, "run: unrecognised option '--rep'; " + kRunUsage});
}

TEST_CASE("no deck at all: missing, a folder, an empty file, noise") {
    const ScratchFolder folder;
    CHECK(refusal(run_of(folder.file("gone.ini"), folder.file("out")), folder) ==
          Refusal{4, "gone.ini: cannot be read: No such file or directory\n"});
    std::filesystem::create_directory(folder.file("decks"));
    CHECK(refusal(run_of(folder.file("decks"), folder.file("out")), folder) ==
          Refusal{4, "decks: cannot be read: Is a directory\n"});
    CHECK(names_in(folder.path().string()) == Arguments{"decks"});
    CHECK(refusal_of_deck("") ==
          Refusal{2, "tube.ini: tube.cathode_radius_mm: missing; allowed: above 0 to 1000 mm\n"});
    std::mt19937 random(20240229);
    std::string noise(10'000, '\0');
    for (char& c : noise) c = static_cast<char>(random());
    CHECK(refusal_of_deck(noise) == Refusal{2, "tube.ini:1: not plain text: byte 0xe8; allowed: UTF-8 text\n"});
}

TEST_CASE("keys and sections that do not exist, with the nearest that do") {
    CHECK(refusal_with("cathode_radius_mm", "cathod_radius_mm") ==
          Refusal{2,
                  "tube.ini:2: tube.cathod_radius_mm: unknown key; the nearest known key is tube.cathode_radius_mm\n"});
    CHECK(refusal_with("[magnet]", "[magnets]") ==
          Refusal{2, "tube.ini:9: [magnets]: unknown section; the nearest known section is [magnet]\n"});
    CHECK(refusal_with("vane_count = 10", "vane_count 10") ==
          Refusal{2, "tube.ini:5: \"vane_count 10\": not a setting; allowed: [section] or key = value\n"});
    CHECK(refusal_with("vane_count = 10\n", "vane_count = 10\nvane_count = 12\n") ==
          Refusal{2, "tube.ini:6: tube.vane_count: given twice; allowed: once (first at tube.ini:5)\n"});
}

TEST_CASE("numbers that are none or out of range") {
    CHECK(refusal_with("= 4150", "= 4.15 kV") ==
          Refusal{2, "tube.ini:7: supply.anode_voltage_V: \"4.15 kV\" is not a number; allowed: above 0 to 1e+06 V\n"});
    CHECK(refusal_with("= 4150", "= nan") ==
          Refusal{2, "tube.ini:7: supply.anode_voltage_V: nan is out of range; allowed: above 0 to 1e+06 V\n"});
    CHECK(refusal_with("= 0.175", "= 1750") ==
          Refusal{2, "tube.ini:10: magnet.field_T: 1750 is out of range; allowed: 0..10 T\n"});
    CHECK(refusal_with("radial_cells = 40", "radial_cells = 40.5") ==
          Refusal{2,
                  "tube.ini:22: grid.radial_cells: \"40.5\" is not a whole number; allowed: a whole number, 8..120\n"});
}

TEST_CASE("a geometry or a mode that cannot be") {
    CHECK(refusal_with("anode_radius_mm = 4.6", "anode_radius_mm = 2") ==
          Refusal{2,
                  "tube.ini:3: tube.anode_radius_mm: 2 mm is not outside the cathode; allowed: more than "
                  "cathode_radius_mm = 2\n"});
    std::string odd = quick_tube_with("vane_count = 10", "vane_count = 9");
    odd.replace(odd.find("cells = 100"), 11, "cells = 90");
    CHECK(refusal_of_deck(odd) == Refusal{2,
                                          "tube.ini:13: circuit.mode_numbers: an odd block of 9 vanes has no pi mode; "
                                          "allowed: mode numbers 1..4\n"});
    CHECK(refusal_with("= 4 5", "= 4 6") ==
          Refusal{2, "tube.ini:13: circuit.mode_numbers: mode 6 of 10 vanes; allowed: mode numbers 1..5\n"});
    CHECK(refusal_with("= 4 5", "= 0 5") ==
          Refusal{2, "tube.ini:13: circuit.mode_numbers: mode 0 of 10 vanes; allowed: mode numbers 1..5\n"});
    CHECK(refusal_with("cathode_radius_mm = 2", "cathode_radius_mm = 0.01") ==
          Refusal{2,
                  "tube.ini:22: grid.radial_cells: 40 cells are 0.115 mm wide each; allowed: cells no wider than "
                  "cathode_radius_mm = 0.01\n"});
    CHECK(refusal_with("mode = 5", "mode = 3") ==
          Refusal{2,
                  "tube.ini:20: prime.voltage_V: mode 3 is not in circuit.mode_numbers; allowed: 0 V, or one of the "
                  "modes 4, 5\n"});
}

TEST_CASE("field tables: missing, a folder, malformed, short") {
    CHECK(refusal_with("field_T = 0.175", "field_table = gone.txt") ==
          Refusal{4,
                  "tube.ini:10: magnet.field_table: gone.txt: cannot be read: No such file or directory; give a file "
                  "that may be read\n"});
    CHECK(refusal_with("field_T = 0.175", "field_table = .") ==
          Refusal{
              4, "tube.ini:10: magnet.field_table: .: cannot be read: Is a directory; give a file that may be read\n"});
    CHECK(refusal_of_table("0 0.17\n2 0.18 T\n5 0.17\n") ==
          Refusal{2, "field.txt:2: 3 columns; allowed: two, the radius in mm and the field in T\n"});
    CHECK(refusal_of_table("0 0.17\n2 strong\n") ==
          Refusal{2, "field.txt:2: \"strong\" is not a number; allowed: 0..10 T\n"});
    CHECK(refusal_of_table("0 0.17\n5 0.18\n4 0.17\n") ==
          Refusal{2, "field.txt:3: the radius does not rise; allowed: radii that rise from row to row\n"});
    CHECK(refusal_of_table("# r_mm B_T\n0 0.17\n4 0.17\n") ==
          Refusal{2, "field.txt:3: covers 0..4 mm; allowed: a table from cathode to anode, 2..4.6 mm\n"});
}

TEST_CASE("a programme whose times do not rise") {
    CHECK(refusal_with("0:0 0.2:1", "0:0 0.2:1 0.1:0.9") ==
          Refusal{2,
                  "tube.ini:8: supply.programme: the time of \"0.1:0.9\" does not rise; allowed: strictly rising "
                  "times\n"});
    CHECK(refusal_with("0:0 0.2:1", "0:0 0.2") ==
          Refusal{2,
                  "tube.ini:8: supply.programme: \"0.2\" is not a pair; allowed: pairs time_ns:share such as 0:0 "
                  "5:1\n"});
}

TEST_CASE("--set that sets nothing") {
    CHECK(refusal_of_setting("field_T") ==
          Refusal{2, "--set field_T: not a setting; allowed: section.key=value on one line, without #\n"});
    CHECK(refusal_of_setting("magnet.feld_T=0.2") ==
          Refusal{2, "--set magnet.feld_T=0.2: magnet.feld_T: unknown key; the nearest known key is magnet.field_T\n"});
    CHECK(refusal_of_setting("magnet.field_T=") ==
          Refusal{2, "--set magnet.field_T=: magnet.field_T: \"\" is not a number; allowed: 0..10 T\n"});
}

TEST_CASE("a clock that would never end") {
    CHECK(refusal_of_setting("clock.step_ps=1e-300") ==
          Refusal{2,
                  "tube.ini:27: clock.end_time_ns: 2 ns are 2e+303 steps of 1e-300 ps; allowed: at most 1e+09 "
                  "steps\n"});
}

TEST_CASE("a hopeless deck stops with every reason and its cure") {
    CHECK(refusal_of_setting("clock.step_ps=20") ==
          Refusal{2,
                  "tube.ini: omega_c dt is 0.616 (good up to 0.3, hopeless above 0.5): set clock.step_ps to at most "
                  "9.75\n"
                  "tube.ini: an electron at the full voltage crosses 12 radial cells in a step (good up to 3, hopeless "
                  "above 6): set clock.step_ps to at most 5.13\n"
                  "tube.ini: omega_p dt is 0.616 in the hub at the cathode (good up to 0.3, hopeless above 0.5): set "
                  "clock.step_ps to at most 9.75\n"});
}

TEST_CASE("a doubtful deck runs, and its warning stands on standard error and in summary.json") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", quick_tube_with("radial_cells = 40", "radial_cells = 30"));
    const Outcome outcome = spokewright::spokewright(run_of(deck, folder.file("out"), {"--quiet"}));
    CHECK(outcome.status == 0);
    const std::string warning =
        "the hub is 7.0 radial cells thick (good from 8, hopeless below 4): set grid.radial_cells to at least 35";
    CHECK(outcome.err == "warning: " + warning + "\n");
    std::ifstream file(folder.file("out/summary.json"));
    CHECK(nlohmann::json::parse(file).at("warnings").at(0) == warning);
}

TEST_CASE("folders that cannot be written") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    CHECK(refusal(run_of(deck, deck), folder) ==
          Refusal{4, "tube.ini: cannot be made: Not a directory; give --out a folder that may be written\n"});
    CHECK(refusal(run_of(deck, deck + "/out"), folder) ==
          Refusal{4, "tube.ini/out: cannot be made: Not a directory; give --out a folder that may be written\n"});
    CHECK(
        refusal(run_of(deck, "/proc/out"), folder) ==
        Refusal{4, "/proc/out: cannot be made: No such file or directory; give --out a folder that may be written\n"});
    // Made without an error, because it is there; only a write tells (also to root) that it takes no files.
    CHECK(
        refusal(run_of(deck, "/proc/self"), folder) ==
        Refusal{4, "/proc/self/.spokewright-trial: cannot write: No such file or directory; make the folder first\n"});
    CHECK(names_in(folder.path().string()) == Arguments{"tube.ini"});
}

TEST_CASE("a result is not overwritten, and nothing but a file is replaced") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    const std::string out = folder.file("out");
    std::filesystem::create_directory(out);
    for (const char* name : {"run.h5", "summary.json", "state.h5"}) {
        const std::string old = folder.write(std::string("out/") + name, "old");
        CHECK(refusal(run_of(deck, out), folder) ==
              Refusal{4, "out: holds a result already; --resume goes on with it, --replace does it anew\n"});
        CHECK(names_in(out) == Arguments{name});
        CHECK(std::filesystem::file_size(old) == 3);
        std::filesystem::remove(old);
    }
    std::filesystem::create_directory(out + "/run.h5");
    CHECK(refusal(run_of(deck, out, {"--replace"}), folder) ==
          Refusal{4, "out/run.h5: is not a file and cannot be replaced; move it away\n"});
    CHECK(names_in(out) == Arguments{"run.h5"});
}

TEST_CASE("nothing to resume, another deck, a damaged state") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    const std::string out = folder.file("out");
    const Arguments resume = run_of(deck, out, {"--set", "clock.end_time_ns=0.1", "--resume", "--quiet"});
    const Refusal nothing{4, "out: no state.h5 to go on from; leave --resume out to start the run\n"};
    CHECK(refusal(resume, folder) == nothing);
    CHECK(names_in(folder.path().string()) == Arguments{"tube.ini"});
    std::filesystem::create_directory(out);
    CHECK(refusal(resume, folder) == nothing);
    CHECK(names_in(out).empty());

    REQUIRE(spokewright::spokewright(run_of(deck, out, {"--set", "clock.end_time_ns=0.1", "--quiet"})).status == 0);
    CHECK(refusal(run_of(deck, out, {"--set", "magnet.field_T=0.17", "--resume"}), folder) ==
          Refusal{2,
                  "out/state.h5: was made from another deck: 'field_T = 0.175' there, 'field_T = 0.17' now; --resume "
                  "allows a new clock.end_time_ns, clock.stop_half_width_percent and [output] section\n"});

    std::ifstream file(folder.file("out/state.h5"), std::ios::binary);
    const std::string good{std::istreambuf_iterator<char>(file), {}};
    const auto refused = [&](const std::string& bytes) {
        folder.write("out/state.h5", bytes);
        return refusal(resume, folder);
    };
    const Refusal damaged{4, "out/state.h5: truncated or damaged: its checksum does not fit; make the file again\n"};
    for (const std::size_t length : {std::size_t{0}, std::size_t{7}, good.size() / 2, good.size() - 1}) {
        CHECK(refused(good.substr(0, length)) == damaged);
    }
    for (int part = 0; part < 20; ++part) {  // numbers, structure, texts and empty space alike
        std::string bytes = good;
        char& byte = bytes[good.size() * static_cast<std::size_t>(part) / 20];
        byte = static_cast<char>(byte ^ 4);
        CHECK(refused(bytes) == damaged);
    }
    CHECK(refused(good) == Refusal{0, ""});
}
