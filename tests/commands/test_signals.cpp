// SPDX-License-Identifier: MIT
// A run that is stopped keeps what it has computed, and --resume goes on to the last bit.
#include <doctest/doctest.h>

#include <cstring>
#include <fstream>
#include <nlohmann/json.hpp>
#include <string>

#include "diagnostics/hdf5_file.hpp"
#include "tests/commands/command.hpp"
#include "tests/commands/quick_tube.hpp"

using namespace spokewright;

namespace {

nlohmann::json summary_in(const std::string& folder) {
    std::ifstream file(folder + "/summary.json");
    return nlohmann::json::parse(file);
}

template <typename T>
bool same_bits(const Hdf5File& a, const Hdf5File& b, const std::string& name) {
    const std::vector<T> left = a.read<T>(name);
    const std::vector<T> right = b.read<T>(name);
    return !left.empty() && left.size() == right.size() &&
           std::memcmp(left.data(), right.data(), left.size() * sizeof(T)) == 0;
}

void check_same_state(const std::string& folder, const std::string& other) {
    const Hdf5File a = Hdf5File::open_sealed(folder + "/state.h5");
    const Hdf5File b = Hdf5File::open_sealed(other + "/state.h5");
    CHECK(a.read_number<std::int64_t>("/clock/step") == b.read_number<std::int64_t>("/clock/step"));
    CHECK(same_bits<std::int32_t>(a, b, "/electrons/r"));
    CHECK(same_bits<std::int32_t>(a, b, "/electrons/theta"));
    CHECK(same_bits<float>(a, b, "/electrons/u_r"));
    CHECK(same_bits<float>(a, b, "/electrons/u_theta"));
    for (const std::string& name : a.list("/circuit")) {
        CAPTURE(name);
        CHECK(same_bits<double>(a, b, "/circuit/" + name));
    }
    for (const std::string& name : a.list("/walls/anode")) {
        if (name == "sector") continue;  // texts
        CAPTURE(name);
        CHECK(same_bits<double>(a, b, "/walls/anode/" + name));
    }
}

/// Every column as long as the first, and more than one sample.
std::size_t samples_in(const std::string& folder, const char* file) {
    const Hdf5File archive = Hdf5File::open_sealed(folder + file);
    const std::size_t samples = archive.read<double>("/series/time_ns").size();
    for (const std::string& name : archive.list("/series")) {
        CAPTURE(name);
        CHECK(archive.read<double>("/series/" + name).size() == samples);
    }
    return samples;
}

/// Stops a run of the quick tube at a fifth of its way; its summary says so.
Outcome stopped_run(const std::string& deck, const std::string& folder, int signal) {
    Command run(run_of(deck, folder));
    run.wait_for_error_text(" 20 %");
    run.signal(signal);
    return run.wait();
}

// Long enough that a fifth of it leaves time to send a signal.
std::string longer_tube(const ScratchFolder& folder) {
    return folder.write("tube.ini", quick_tube_with("end_time_ns = 2", "end_time_ns = 6"));
}

}  // namespace

TEST_CASE("SIGINT in mid-run: status 130, all files open and hold what was computed") {
    const ScratchFolder folder;
    const std::string deck = longer_tube(folder);
    const std::string out = folder.file("out");
    const Outcome outcome = stopped_run(deck, out, SIGINT);
    CHECK(outcome.status == 130);
    CHECK(outcome.out.find("status       not settled") == 0);
    CHECK(names_in(out) == Arguments{"run.h5", "state.h5", "summary.json"});

    const nlohmann::json summary = summary_in(out);
    const double stopped_at = summary.at("end_time_ns");
    CHECK(stopped_at > 1);
    CHECK(stopped_at < 6);
    CHECK(summary.at("status") == "not settled");
    CHECK(summary.at("electrons") > 0);
    const std::string warning = summary.at("warnings").at(0);
    CHECK(warning.find("stopped at ") == 0);
    CHECK(warning.find(" of 6.0 ns; continue with --resume") != std::string::npos);

    CHECK(samples_in(out, "/run.h5") > 20);  // a fifth of the run: 460 steps, 16 a sample
    CHECK(samples_in(out, "/state.h5") == samples_in(out, "/run.h5"));
    CHECK(Hdf5File::open(out + "/run.h5").read<float>("/snapshots/0/electron_radius_m").size() > 1000);

    SUBCASE("a resumed run ends as one that was never stopped") {
        REQUIRE(spokewright::spokewright(run_of(deck, out, {"--resume", "--quiet"})).status == 0);
        REQUIRE(spokewright::spokewright(run_of(deck, folder.file("whole"), {"--quiet"})).status == 0);
        check_same_state(out, folder.file("whole"));
        const Hdf5File resumed = Hdf5File::open(out + "/run.h5");
        const Hdf5File whole = Hdf5File::open(folder.file("whole/run.h5"));
        for (const std::string& name : whole.list("/series")) {
            CAPTURE(name);
            CHECK(same_bits<double>(resumed, whole, "/series/" + name));
        }
        CHECK(summary_in(out).at("status") == summary_in(folder.file("whole")).at("status"));
        CHECK(summary_in(out).at("warnings") == summary_in(folder.file("whole")).at("warnings"));
    }
}

TEST_CASE("SIGTERM: status 143, and the files") {
    const ScratchFolder folder;
    const std::string out = folder.file("out");
    CHECK(stopped_run(longer_tube(folder), out, SIGTERM).status == 143);
    CHECK(names_in(out) == Arguments{"run.h5", "state.h5", "summary.json"});
    CHECK(samples_in(out, "/run.h5") > 20);
}

TEST_CASE("a finished run goes on to a later end time") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    const std::string out = folder.file("out");
    const std::string whole = folder.file("whole");
    REQUIRE(spokewright::spokewright(run_of(deck, out, {"--quiet"})).status == 0);
    const Arguments later{"--quiet", "--set", "clock.end_time_ns=3"};
    REQUIRE(spokewright::spokewright(run_of(deck, whole, later)).status == 0);
    Arguments more = later;
    more.push_back("--resume");
    REQUIRE(spokewright::spokewright(run_of(deck, out, more)).status == 0);
    check_same_state(out, whole);
    CHECK(summary_in(out).at("end_time_ns") == summary_in(whole).at("end_time_ns"));
}

TEST_CASE("a run that is over can be resumed without harm") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    const std::string out = folder.file("out");
    const std::string whole = folder.file("whole");
    REQUIRE(spokewright::spokewright(run_of(deck, out, {"--quiet"})).status == 0);
    std::filesystem::copy(out, whole);
    REQUIRE(spokewright::spokewright(run_of(deck, out, {"--quiet", "--resume"})).status == 0);
    check_same_state(out, whole);
    CHECK(samples_in(out, "/run.h5") == samples_in(whole, "/run.h5"));
}
