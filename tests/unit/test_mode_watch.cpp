// SPDX-License-Identifier: MIT
#include <doctest/doctest.h>

#include <cmath>

#include "diagnostics/mode_watch.hpp"
#include "tests/played_run.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

/// A watch that sees one sample each 0.1 ns. The deck's modes are 4 (2.80 GHz) and 5 (2.45 GHz), the threshold 210 V.
struct Watched {
    ModeWatch watch{played_deck()};
    double time_ns = 0;
    void hold(double for_ns, double volts_4, double volts_5) {
        const double end = time_ns + for_ns;
        while (time_ns < end - 0.05) {
            time_ns += 0.1;
            const double voltages[] = {volts_4, volts_5};
            const double energies[] = {0.5e-12 * volts_4 * volts_4, 0.5e-12 * volts_5 * volts_5};
            watch.observe(time_ns, voltages, energies);
        }
    }
};

}  // namespace

TEST_CASE("start, shift and loss, each dated at its beginning") {
    Watched seen;
    seen.hold(10, 5, 8);
    CHECK(seen.watch.leading() == 0);
    seen.hold(10, 5, 900);
    CHECK(seen.watch.leading() == 5);
    seen.hold(10, 1500, 900);
    CHECK(seen.watch.leading() == 4);
    seen.hold(10, 5, 8);
    CHECK(seen.watch.leading() == 0);
    seen.watch.finish(seen.time_ns);
    const auto& events = seen.watch.events();
    REQUIRE(events.size() == 3);
    CHECK(events[0].kind == "mode start");
    CHECK(relative_error(events[0].time_ns, 10.1) < 1e-9);  // the first sample of the new state
    CHECK(events[0].to == 5);
    CHECK(events[1].kind == "mode shift");
    CHECK(events[1].from == 5);
    CHECK(events[1].to == 4);
    CHECK(events[2].kind == "mode loss");
    CHECK(relative_error(events[2].time_ns, 30.1) < 1e-9);
    CHECK(events[2].to == 0);
}

TEST_CASE("a lead shorter than ten periods of the challenger is no event") {
    Watched seen;
    seen.hold(10, 0, 900);
    seen.hold(3.4, 1500, 900);  // ten periods of 2.80 GHz are 3.57 ns
    seen.hold(5, 0, 900);
    CHECK(seen.watch.events().size() == 1);
    seen.hold(3.8, 1500, 900);
    CHECK(seen.watch.events().size() == 2);
}

TEST_CASE("a beat between two modes keeps the one that leads longest from losing its place") {
    Watched seen;
    seen.hold(10, 0, 900);
    for (int beat = 0; beat < 20; ++beat) {
        seen.hold(2, 1500, 900);
        seen.hold(1, 600, 900);
    }
    CHECK(seen.watch.leading() == 5);
    CHECK(seen.watch.events().size() == 1);
}

TEST_CASE("a mode skip: a deck with modes, none of which ever starts") {
    Watched seen;
    seen.hold(50, 209, 209);  // just below 5 % of 4200 V
    seen.watch.finish(seen.time_ns);
    REQUIRE(seen.watch.events().size() == 1);
    CHECK(seen.watch.events()[0].kind == "mode skip");
    CHECK(relative_error(seen.watch.events()[0].time_ns, 50) < 1e-9);

    Deck bore = played_deck();
    bore.circuit.modes.clear();
    ModeWatch none(bore);
    none.observe(1, {}, {});
    none.finish(2);
    CHECK(none.events().empty());
}

TEST_CASE("a watch over a whole record sees the same as one that goes along") {
    PlayedRun run;
    run.mode_voltage[1] = [](double time) { return time < 10e-9 ? 20.0 : 2000.0; };
    Record record(run.deck);
    run.play(record, 20e-9);
    const ModeWatch going = watch_modes(run.deck, record, false);
    CHECK(going.leading() == 5);
    REQUIRE(going.events().size() == 1);
    CHECK(std::abs(going.events()[0].time_ns - 10) < 0.033);  // one sample
    CHECK(watch_modes(run.deck, Record(run.deck), true).events().empty());
}
