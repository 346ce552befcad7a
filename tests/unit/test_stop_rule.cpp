// SPDX-License-Identifier: MIT
#include "diagnostics/stop_rule.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <functional>

#include "tests/played_run.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

struct Ended {
    double time_ns = 0;  // end time when the rule let it run
    std::string reason;
};

/// Plays the run and asks at every sample.
Ended play(PlayedRun run, double half_width = 0.01) {
    run.deck.clock.stop_half_width = half_width;
    Record record(run.deck);
    StopRule rule(run.deck);
    const auto steps = static_cast<std::int64_t>(std::lround(run.deck.clock.end_time / run.deck.clock.step));
    while (run.step < steps) {
        record.add(run.tally());
        if (run.step % run.deck.clock.sample_every != 0) continue;
        run.sample_into(record);
        if (const auto reason = rule.look(record)) return {record.last("time_ns"), *reason};
    }
    return {run.deck.clock.end_time * 1e9, ""};
}

/// The pi mode up within some ns of the flat top, a per cent of ripple; 400 ns.
PlayedRun locked_run() {
    PlayedRun run;
    run.deck.clock.end_time = 400e-9;
    run.deck.clock.sample_every = 64;
    run.deck.circuit.modes[1].external_q = 50;
    const auto rise = [](double time) { return 1 - std::exp(-time / 2e-9); };
    run.current = [rise](double time) { return 1.5 * rise(time) * (1 + 0.01 * std::sin(2 * kPi * 0.3e9 * time)); };
    run.mode_voltage[1] = [rise](double time) { return 2000 * rise(time); };
    return run;
}

PlayedRun silent_run() {
    PlayedRun run = locked_run();
    run.mode_voltage = {[](double time) { return 1 + 0.3 * std::sin(3e9 * time); },
                        [](double time) { return 2 + 0.5 * std::sin(2e9 * time); }};
    return run;
}

}  // namespace

TEST_CASE("a straight line has its slope, and no room above it") {
    const std::vector<double> line{1, 3, 5, 7, 9};
    CHECK(relative_error(fitted_slope(line).value, 2) < 1e-14);
    CHECK(relative_error(fitted_slope(line).upper, 2) < 1e-14);
}

TEST_CASE("scatter about a line leaves room above its slope") {
    // Residuals +-1 about 2 k: rest 10, squares 82.5 for ten values less the slope they make.
    std::vector<double> values;
    for (int k = 0; k < 10; ++k) values.push_back(2 * k + (k % 2 == 0 ? 1 : -1));
    const Slope slope = fitted_slope(values);
    CHECK(relative_error(slope.value, 2 - 5 / 82.5) < 1e-12);
    const double rest = 10 - 25 / 82.5;
    CHECK(relative_error(slope.upper - slope.value, 2.896 * std::sqrt(rest / 8 / 82.5)) < 1e-12);
}

TEST_CASE("a settled run ends once its means are known, after the resonators' memory") {
    const Ended ended = play(locked_run());
    CHECK(ended.reason == "settled, means known to 1 %");
    // Three fill times at Q_L = 48 are 18.8 ns after some 10 ns of build-up, two looks of 10 ns.
    CHECK(ended.time_ns > 28);
    CHECK(ended.time_ns < 120);
}

TEST_CASE("without a half-width asked for, it runs to its end") {
    CHECK(play(locked_run(), 0).reason == "");
}

TEST_CASE("a sharper half-width takes longer") {
    PlayedRun noisy = locked_run();
    noisy.current = [](double time) { return 1.5 * (1 + 0.2 * std::sin(2 * kPi * 0.031e9 * time)); };
    CHECK(play(noisy, 0.01).time_ns > play(noisy, 0.05).time_ns);
}

TEST_CASE("a neighbour that grows out of the noise keeps a settled run going") {
    PlayedRun run = locked_run();
    run.mode_voltage[0] = [](double time) { return 25 * std::exp(time / 100e-9); };  // 25 V to 1.4 kV
    CHECK(play(run).reason == "");
}

TEST_CASE("a silent tube ends as a skip once no growth seen could still start a mode") {
    const Ended ended = play(silent_run());
    CHECK(ended.reason == "no mode can reach 5 % of the anode voltage before 400 ns at the growth seen");
    CHECK(ended.time_ns > 38);
    CHECK(ended.time_ns < 390);
}

TEST_CASE("a slow start is no skip: growth that reaches the share in time keeps the run going") {
    PlayedRun run = silent_run();
    run.mode_voltage[1] = [](double time) { return 2 * std::exp(time / 70e-9); };  // 210 V at 326 ns
    const Ended ended = play(run);
    CHECK(ended.time_ns > 320);
}

TEST_CASE("nothing is judged before the flat top, before the priming, or on a pulse that falls") {
    PlayedRun rising = locked_run();
    rising.deck.supply.programme = {{0, 0}, {390e-9, 1}};
    CHECK(play(rising).reason == "");
    PlayedRun primed = silent_run();
    primed.deck.prime = {5, 600, 380e-9};
    CHECK(play(primed).reason == "");
    PlayedRun pulse = locked_run();
    pulse.deck.supply.programme = {{0, 0}, {5e-9, 1}, {395e-9, 1}, {400e-9, 0}};
    CHECK(play(pulse).reason == "");
}
