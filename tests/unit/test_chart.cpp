// SPDX-License-Identifier: MIT
// The chart puts the formulas of theory.hpp together; they are tested there and in tests/published.
#include "diagnostics/chart.hpp"

#include <doctest/doctest.h>

#include <cmath>

#include "diagnostics/theory.hpp"
#include "tests/relative_error.hpp"
#include "tests/unit/small_deck.hpp"

using namespace spokewright;

namespace {
constexpr double kExact = 1e-12;  // the same formula, rounded

Chart chart_of(const std::vector<std::string>& overrides = {}, const std::string& text = kSmallDeck + kCircuit) {
    return operating_chart(read_text(text, overrides));
}
}  // namespace

TEST_CASE("the smooth bore's numbers at the deck's point") {
    const Chart chart = chart_of();
    CHECK(relative_error(chart.cyclotron_frequency, 27.9924898e9 * 0.175) < 1e-8);  // CODATA e / (2 pi m), nine figures
    CHECK(relative_error(chart.hull_voltage.value, hull_voltage(0.175, 2e-3, 4.6e-3)) < kExact);
    CHECK(relative_error(chart.hull_voltage.nonrelativistic, hull_voltage_nonrelativistic(0.175, 2e-3, 4.6e-3)) <
          kExact);
    CHECK(relative_error(chart.hull_field.value, hull_field(4150, 2e-3, 4.6e-3)) < kExact);
    const BrillouinHub hub = brillouin_hub_relativistic(0.175, 2e-3, 4.6e-3, 4150);
    CHECK(relative_error(chart.hub_radius.value, hub.radius) < kExact);
    CHECK(relative_error(chart.hub_speed.value, hub.edge_speed) < kExact);
    CHECK(relative_error(chart.hub_charge.value, 10e-3 * hub.charge_per_length) < kExact);
    CHECK_FALSE(chart.above_hull);
}

TEST_CASE("waves: each mode's own, one backward, one forward; the pi mode has no backward twin") {
    const Chart chart = chart_of();
    REQUIRE(chart.waves.size() == 5);
    const int expected[5][3] = {{3, 0, 3}, {3, -1, -7}, {3, 1, 13}, {5, 0, 5}, {5, 1, 15}};
    for (std::size_t k = 0; k < 5; ++k) {
        const ChartWave& wave = chart.waves[k];
        CHECK(wave.mode == expected[k][0]);
        CHECK(wave.k == expected[k][1]);
        CHECK(wave.harmonic == expected[k][2]);
        CHECK(relative_error(wave.hartree_voltage.value,
                             hartree_voltage(0.175, 2e-3, 4.6e-3, std::abs(wave.harmonic), wave.frequency)) < kExact);
    }
    CHECK(chart.pi.mode == 5);
    CHECK(chart.no_pi_mode == "");
}

TEST_CASE("below B0 a wave has no threshold") {
    const Chart chart = chart_of({"magnet.field_T=0.042"});  // B0 of the pi mode is 43.2 mT
    CHECK(std::isnan(chart.pi.hartree_voltage.value));
    CHECK(std::isnan(chart.window.low));
    CHECK(std::isnan(chart.window.high));
    CHECK_FALSE(std::isnan(chart_of({"magnet.field_T=0.044"}).pi.hartree_voltage.value));
}

TEST_CASE("window: from the pi mode's threshold to the next one of another mode, or to Hull") {
    const Chart chart = chart_of();
    CHECK(chart.window.low == chart.pi.hartree_voltage.value);
    CHECK(chart.window.high == chart.waves[0].hartree_voltage.value);  // mode 3
    CHECK(chart.window.limiting_mode == 3);
    CHECK(chart.window.below.empty());
    CHECK(chart.harmonic_window.high == chart.waves[1].hartree_voltage.value);  // its backward harmonic
    CHECK(chart.harmonic_window.limiting_harmonic == -7);
    REQUIRE(chart.harmonic_window.below.size() == 1);
    CHECK(chart.harmonic_window.below[0].harmonic == 13);

    const Chart fast = chart_of({"circuit.frequencies_GHz=20 2.45"});  // mode 3 would need more than 0.175 T
    CHECK(fast.window.high == fast.hull_voltage.value);
    CHECK(fast.window.limiting_mode == 0);

    const Chart twin = chart_of({"circuit.frequencies_GHz=3.43 2.45"});  // 3.43 / 7 = 2.45 / 5 but for rounding
    CHECK(twin.harmonic_window.below.size() == 2);

    const Chart slow = chart_of({"circuit.frequencies_GHz=1.4 2.45"});  // 1.4 / 3 < 2.45 / 5
    REQUIRE(slow.window.below.size() == 1);
    CHECK(slow.window.below[0].mode == 3);
}

TEST_CASE("efficiency bounds and circuit of the pi mode") {
    const Chart chart = chart_of();
    const double v0 = synchronous_voltage_relativistic(4.6e-3, 5, 2.45e9);
    CHECK(relative_error(chart.drift_bound.value, 1 - v0 / 4150) < kExact);
    CHECK(relative_error(chart.cycloid_bound.value, 1 - 2 * v0 / 4150) < kExact);
    CHECK(relative_error(chart.loaded_q, 1 / (1.0 / 1500 + 1.0 / 167)) < kExact);
    CHECK(relative_error(chart.circuit_efficiency, 1500.0 / 1667) < kExact);
    CHECK(relative_error(chart.total_bound, chart.drift_bound.value * 1500 / 1667) < kExact);
    CHECK(relative_error(chart.pulling_figure, 2.45e9 / 334 * (1.5 - 1 / 1.5)) < kExact);
    CHECK(std::isnan(chart_of({"supply.anode_voltage_V=1000"}).cycloid_bound.value));  // below 2 V0 = 1142 V
    CHECK(std::isnan(chart_of({"supply.anode_voltage_V=500"}).drift_bound.value));
    // A load of VSWR 2 in phase takes y = 2 or 1/2 of the matched one: Gamma = -1/3 or 1/3.
    CHECK(relative_error(chart_of({"load.vswr=2", "load.phase_deg=180"}).circuit_efficiency,
                         (2.0 / 167) / (2.0 / 167 + 1.0 / 1500)) < kExact);
}

TEST_CASE("what is missing is named") {
    CHECK(chart_of({}, kSmallDeck).no_pi_mode == "no circuit: set circuit.source = table");
    CHECK(chart_of({"tube.vane_count=0"}, kSmallDeck).no_pi_mode == "no modes: tube.vane_count = 0");
    CHECK(chart_of({"tube.vane_count=11"}).no_pi_mode == "an odd block of 11 vanes has no pi mode");
    CHECK(chart_of({"tube.vane_count=12"}).no_pi_mode == "the pi mode 6 is not in circuit.mode_numbers");
    const Chart bare = chart_of({"magnet.field_T=0"});
    CHECK(std::isnan(bare.hull_voltage.value));
    CHECK(std::isnan(bare.hub_radius.value));
    CHECK(std::isnan(bare.window.low));
    CHECK(bare.above_hull);
    CHECK(std::isnan(chart_of({"magnet.field_T=0.1"}).hub_charge.value));  // above Hull
}
