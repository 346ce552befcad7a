// SPDX-License-Identifier: MIT
#include <doctest/doctest.h>

#include <cmath>
#include <nlohmann/json.hpp>

#include "diagnostics/summary.hpp"
#include "diagnostics/summary_text.hpp"
#include "diagnostics/theory.hpp"
#include "tests/played_run.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

constexpr double kMeanError = 2e-3;  // the played currents ripple by a per cent, averaged over many ripples

/// Steady from 20 ns on, with a ripple to make the means uncertain.
PlayedRun locked_run() {
    PlayedRun run;
    const auto rise = [](double time) { return 1 - std::exp(-time / 2e-9); };
    run.current = [rise](double time) { return 1.5 * rise(time) * (1 + 0.01 * std::sin(2 * kPi * 0.3e9 * time)); };
    run.mode_voltage[1] = [rise](double time) { return 2000 * rise(time); };
    return run;
}

Summary summary_of(PlayedRun& run, double until = 100e-9, RunFacts facts = {}) {
    Record record(run.deck);
    run.play(record, until);
    facts.version = "0.1.0";
    facts.steps = run.step;
    facts.macro_weight = 60000;
    return summarise(run.deck, record, run.books, facts);
}

}  // namespace

TEST_CASE("a locked tube: settled, with its currents, powers, mode, spokes and frequency") {
    PlayedRun run = locked_run();
    run.books.anode.sector_energy.assign(20, 10);
    run.books.anode.sector_energy[6] = 60;  // vane 3
    const Summary s = summary_of(run);
    CHECK(s.status == "settled");
    CHECK(s.settled_from_ns >= 5);
    CHECK(s.settled_from_ns < 50);
    CHECK(relative_error(s.end_time_ns, 100) < 1e-9);
    CHECK(relative_error(s.anode_current_A.mean, 1.5) < kMeanError);
    CHECK(s.anode_current_A.half_width > 0);
    CHECK(s.anode_current_A.half_width < 0.01 * 1.5);
    CHECK(relative_error(s.rf_power_W.mean, 0.6 * 6300) < kMeanError);
    CHECK(relative_error(s.electronic_efficiency.mean, 0.6) < 1e-9);
    CHECK(relative_error(s.total_efficiency.mean, 0.54) < 1e-9);
    CHECK(s.dominant_mode == 5);
    CHECK(s.pi_mode);
    CHECK(s.spoke_count == 5);
    CHECK(relative_error(s.spoke_strength.mean, 0.4) < 1e-9);
    CHECK(relative_error(s.frequency_GHz.mean, 2.449) < 1e-8);
    CHECK(relative_error(s.frequency_shift_MHz.mean, -1) < 1e-4);  // a difference of 1 in 2450
    CHECK(relative_error(s.hartree_voltage_V, hartree_voltage(0.185, 1.95e-3, 4.45e-3, 5, 2.45e9)) < 1e-12);
    CHECK(relative_error(s.hull_voltage_V, hull_voltage(0.185, 1.95e-3, 4.45e-3)) < 1e-12);
    CHECK(s.hottest_vane == 3);
    CHECK(relative_error(s.hottest_vane_share, 60.0 / 250) < 1e-12);
    CHECK(s.energy_imbalance < 1e-9);
    CHECK(s.charge_imbalance_C == 0);
    REQUIRE(s.modes.size() == 2);
    CHECK(s.modes[0].mode == 4);
    CHECK(s.warnings.empty());
    REQUIRE(s.mode_events.size() == 1);
    CHECK(s.mode_events[0].kind == "mode start");
}

TEST_CASE("a mode skip is no oscillation; one that still grows is not settled") {
    PlayedRun silent = locked_run();
    silent.mode_voltage[1] = [](double) { return 20.0; };
    silent.bunching = 0.01;
    const Summary skip = summary_of(silent);
    CHECK(skip.status == "no oscillation");
    CHECK(skip.dominant_mode == 0);
    CHECK(skip.spoke_count == 0);
    CHECK(std::isnan(skip.frequency_GHz.mean));
    CHECK(std::isnan(skip.settled_from_ns));
    CHECK(skip.mode_events.at(0).kind == "mode skip");
    CHECK(relative_error(skip.hartree_voltage_V, hartree_voltage(0.185, 1.95e-3, 4.45e-3, 5, 2.45e9)) < 1e-12);  // pi

    PlayedRun growing = locked_run();
    growing.mode_voltage[1] = [](double time) { return 0.5 * std::exp(time / 18e-9); };  // 129 V at 100 ns
    const Summary slow = summary_of(growing);
    CHECK(slow.status == "not settled");
    CHECK(slow.warnings.back() == "mode 5 is still growing: lengthen clock.end_time_ns");

    PlayedRun stopped = locked_run();
    stopped.mode_voltage[1] = [](double) { return 20.0; };
    RunFacts facts;
    facts.interrupted = true;
    const Summary early = summary_of(stopped, 40e-9, facts);
    CHECK(early.status == "not settled");
    CHECK(early.warnings.at(0) == "stopped at 40.0 of 100.0 ns; continue with --resume");
}

TEST_CASE("a flat top too short to see a mode start is not settled, and says so") {
    PlayedRun brief = locked_run();
    brief.mode_voltage[1] = [](double) { return 20.0; };
    brief.deck.clock.end_time = 12e-9;  // 7 ns of flat top, 17 periods of the pi mode
    const Summary s = summary_of(brief, brief.deck.clock.end_time);
    CHECK(s.status == "not settled");
    REQUIRE(!s.warnings.empty());
    CHECK(s.warnings.back() ==
          "the flat top is shorter than 20 periods of mode 4, too short to see a mode start: lengthen "
          "clock.end_time_ns");
}

TEST_CASE("a bunching that the shot noise of a few electrons could make is no spoke") {
    PlayedRun noisy = locked_run();
    noisy.bunching = 0.06;  // some 2000 macro-electrons beyond mid-gap: noise of 2 %, up to 7 %
    CHECK(summary_of(noisy).spoke_count == 0);
    PlayedRun bunched = locked_run();
    bunched.bunching = 0.08;
    CHECK(summary_of(bunched).spoke_count == 5);
}

TEST_CASE("below Hull and Hartree with nothing seen it is cut off; with current seen it is not") {
    PlayedRun run = locked_run();
    run.deck.supply.anode_voltage = 3000;  // Hartree 4.0 kV, Hull 9.7 kV
    run.mode_voltage[1] = [](double) { return 1.0; };
    run.current = [](double) { return 1e-3; };
    CHECK(summary_of(run).status == "cut off");
    PlayedRun leaking = run;
    leaking.step = 0;
    leaking.current = [](double) { return 1.0; };  // the free current would be some 15 A
    CHECK(summary_of(leaking).status == "no oscillation");
    PlayedRun quiet = locked_run();  // 4200 V: above Hartree, so a tube without current has skipped
    quiet.mode_voltage[1] = [](double) { return 1.0; };
    quiet.current = [](double) { return 1e-3; };
    CHECK(summary_of(quiet).status == "no oscillation");
}

TEST_CASE("a smooth bore settles on its current alone") {
    PlayedRun run = locked_run();
    run.deck.tube.vane_count = 0;
    run.deck.circuit.modes.clear();
    run.mode_voltage.clear();
    run.deck.supply.anode_voltage = 12000;  // above Hull
    const Summary s = summary_of(run);
    CHECK(s.status == "settled");
    CHECK(s.modes.empty());
    CHECK(s.mode_events.empty());
    CHECK(std::isnan(s.hartree_voltage_V));
    run.deck.supply.anode_voltage = 4000;
    run.current = [](double) { return 1e-6; };
    run.step = 0;
    run.in_flight = 0;
    CHECK(summary_of(run).status == "cut off");
}

TEST_CASE("a pulse is judged on its flat top") {
    PlayedRun run = locked_run();
    run.deck.supply.programme = {{0, 0}, {5e-9, 1}, {70e-9, 1}, {75e-9, 0}};
    const auto in_pulse = run.mode_voltage[1];
    run.mode_voltage[1] = [in_pulse](double time) { return time < 70e-9 ? in_pulse(time) : 1.0; };
    const Summary s = summary_of(run);
    CHECK(s.status == "settled");
    CHECK(s.dominant_mode == 5);
    CHECK(s.averaged_to_ns < 70.01);
    CHECK(relative_error(s.anode_current_A.mean, 1.5) < kMeanError);
    CHECK(s.mode_events.back().kind == "mode loss");
}

TEST_CASE("no record, or a run that never reached its voltage, is not settled and not a crash") {
    PlayedRun run = locked_run();
    const Summary none = summary_of(run, 0);
    CHECK(none.status == "not settled");
    CHECK(std::isnan(none.anode_current_A.mean));
    PlayedRun rising = locked_run();
    CHECK(summary_of(rising, 4e-9).status == "not settled");
    CHECK(summary_lines(none).size() <= 25);
    CHECK(summary_json(none)["anode_current_A"].is_null());
}

TEST_CASE("a tube has locked when its mode keeps the generator's frequency to 5 % of Adler's half band") {
    // 34.02 W beside 3402 W to the load, Q_ext 150 at 2.45 GHz: a half band of 1.633 MHz, 5 % of it is 0.082 MHz.
    const auto driven = [](int mode, double offset) {
        PlayedRun run = locked_run();  // its mode 5 stands at 2.449 GHz
        run.deck.drive = {mode, 34.02, 2.449e9 + offset, 0, 0};
        return summary_of(run);
    };
    for (const double offset : {0.0, 0.07e6, -0.07e6}) CHECK(driven(5, offset).locked);
    for (const double offset : {0.1e6, -0.1e6, 5e6}) CHECK_FALSE(driven(5, offset).locked);
    CHECK_FALSE(driven(4, 2.8e9 - 2.449e9).locked);  // mode 4 rings at the generator's 2.8 GHz, but mode 5 runs
    CHECK(relative_error(driven(5, 0).drive_frequency_GHz, 2.449) < 1e-12);
    CHECK(driven(5, 0).drive_power_W == 34.02);
    PlayedRun free = locked_run();
    CHECK_FALSE(summary_of(free).locked);
}

TEST_CASE("the generator's own power is none of the tube's efficiency") {
    PlayedRun run = locked_run();
    run.deck.drive = {5, 63, 2.449e9, 0, 0};
    CHECK(relative_error(summary_of(run).total_efficiency.mean, 0.54 - 0.01) < kMeanError);
    PlayedRun later = locked_run();
    later.deck.drive = {5, 63, 2.449e9, 0, 1};
    CHECK(relative_error(summary_of(later).total_efficiency.mean, 0.54) < 1e-9);  // a generator still switched off
}

TEST_CASE("open books are warned of") {
    PlayedRun run = locked_run();
    run.lost_energy = 0.02;
    run.stray_electrons = 1;
    const Summary s = summary_of(run);
    CHECK(relative_error(s.energy_imbalance, 0.02) < 1e-6);
    CHECK(relative_error(s.charge_imbalance_C, 60000 * kElementaryCharge) < 1e-12);
    REQUIRE(s.warnings.size() == 2);
    CHECK(s.warnings[0] == "the energy ledger is open by 2 %: lower clock.step_ps or raise electrons.target_count");
}
