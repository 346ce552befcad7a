// SPDX-License-Identifier: MIT
#include <doctest/doctest.h>

#include <cmath>
#include <cstring>

#include "diagnostics/record.hpp"
#include "inputs/errors.hpp"
#include "tests/played_run.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {
constexpr double kRounding = 1e-11;  // sums of a few thousand doubles

bool same_bits(const std::vector<double>& a, const std::vector<double>& b) {
    return a.size() == b.size() && std::memcmp(a.data(), b.data(), a.size() * sizeof(double)) == 0;
}
}  // namespace

TEST_CASE("an interval's charges and energies become mean currents and powers") {
    PlayedRun run;
    run.current = [](double time) { return 1e9 * time; };
    Record record(run.deck);
    run.play(record, 3.2e-9);  // 1600 steps, 100 samples
    REQUIRE(record.samples() == 100);
    const double start = 3.2e-9 - 16 * 2e-12;
    const double mean_time = 0.5 * (start + 2e-12 + 3.2e-9);  // steps are counted at their ends
    CHECK(relative_error(record.last("time_ns"), 3.2) < kRounding);
    CHECK(relative_error(record.last("anode_current_A"), 1e9 * mean_time) < kRounding);
    CHECK(relative_error(record.last("input_power_W"), 4200e9 * mean_time) < kRounding);
    CHECK(relative_error(record.last("mode_power_W"), 0.6 * 4200e9 * mean_time) < kRounding);
    CHECK(relative_error(record.last("load_power_W"), 0.54 * 4200e9 * mean_time) < kRounding);
    CHECK(relative_error(record.last("wall_loss_W"), 0.06 * 4200e9 * mean_time) < kRounding);
    CHECK(relative_error(record.last("anode_heat_W"), 0.35 * 4200e9 * mean_time) < kRounding);
    CHECK(relative_error(record.last("cathode_heat_W"), 0.05 * 4200e9 * mean_time) < kRounding);
    const double ampere = 1e-14 / 2e-12;  // one macro-electron a step
    CHECK(relative_error(record.last("emitted_current_A"), 10 * ampere) < kRounding);
    CHECK(relative_error(record.last("secondary_current_A"), 2 * ampere) < kRounding);
    CHECK(relative_error(record.last("anode_hit_current_A"), 7 * ampere) < kRounding);
    CHECK(relative_error(record.last("cathode_return_current_A"), 3 * ampere) < kRounding);
    CHECK(record.last("electrons") == 12000);
    CHECK(relative_error(record.last("self_field_percent"), 0.1) < kRounding);
    CHECK(relative_error(record.last("supply_energy_J"), record.totals().supply_energy) < kRounding);
    CHECK(record.totals().charge_mismatch == 0);
}

TEST_CASE("a mode's frequency is found on the branch next to the cold one, below and above it") {
    for (const double frequency : {2.449e9, 2.2e9, 2.7e9}) {
        PlayedRun run;
        run.mode_frequency[1] = frequency;
        run.deck.clock.sample_every = 500;  // 1 ns: several turns a sample, room of 500 MHz either way
        Record record(run.deck);
        run.play(record, 5e-9);
        CHECK(std::isnan(record.mode_column(5, "frequency_GHz").front()));
        CHECK(relative_error(record.last("mode_5_frequency_GHz"), frequency * 1e-9) < 1e-9);  // phase rounding
        CHECK(relative_error(record.last("mode_5_voltage_V"), 2000) < kRounding);
        CHECK(relative_error(record.last("mode_5_energy_J"), 2e-6) < kRounding);
        CHECK(record.last("mode_5_backward_V") == 0);
        const double phase = std::atan2(record.last("mode_5_im_V"), record.last("mode_5_re_V"));
        CHECK(std::abs(std::remainder(phase - 2 * kPi * frequency * 5e-9, 2 * kPi)) < 1e-9);
    }
}

TEST_CASE("harmonics of the charge beyond mid-gap") {
    PlayedRun run;
    Record record(run.deck);
    run.play(record, 64e-12);
    const double even = record.last("charge_harmonic_0_C");
    double expected = 0;  // rows 4 to 8 of 8, a quarter of the density
    const PolarGrid grid{1.95e-3, 4.45e-3, 9.5e-3, 8, 40};
    for (int i = 4; i <= 8; ++i) expected += 40 * 1e-13 * 0.25 * grid.node_volume(i) / grid.node_volume(0);
    CHECK(relative_error(even, expected) < kRounding);
    CHECK(relative_error(record.last("charge_harmonic_5_C"), 0.4 * even) < kRounding);
    CHECK(record.last("charge_harmonic_4_C") < 1e-12 * even);  // FFT rounding
    CHECK(record.charge_harmonics() == 10);
}

TEST_CASE("the hub's radius is the outermost crossing of half the peak density") {
    const PolarGrid grid{1e-3, 3e-3, 1e-2, 8, 4};
    std::vector<double> charge(grid.nodes());
    const double density[] = {8, 10, 9, 2, 7, 4, 1, 0, 0};  // a dip inside, 5 lies between rows 4 and 5
    for (int i = 0; i <= 8; ++i) {
        for (int j = 0; j < 4; ++j) charge[grid.node(i, j)] = -density[i] * grid.node_volume(i);
    }
    CHECK(relative_error(hub_radius(grid, charge), grid.radius(4) + grid.dr() * 2.0 / 3) < kRounding);
    std::fill(charge.begin(), charge.end(), 0.0);
    CHECK(hub_radius(grid, charge) == grid.cathode_radius);
}

TEST_CASE("a restored record goes on to the last bit") {
    PlayedRun run;
    Record whole(run.deck);
    run.play(whole, 1e-9);
    for (int k = 0; k < 5; ++k) whole.add(run.tally());  // stop between two samples
    Record resumed(run.deck);
    resumed.restore(whole.columns(), whole.state());
    PlayedRun copy = run;
    run.play(whole, 2e-9);
    copy.play(resumed, 2e-9);
    REQUIRE(whole.samples() == resumed.samples());
    for (std::size_t k = 0; k < whole.columns().size(); ++k) {
        CHECK(same_bits(whole.columns()[k].values, resumed.columns()[k].values));
    }
    CHECK(same_bits(whole.state(), resumed.state()));
}

TEST_CASE("a record of another deck is refused") {
    PlayedRun run;
    Record record(run.deck);
    auto columns = record.columns();
    columns.back().name = "something_else";
    CHECK_THROWS_WITH_AS(record.restore(columns, record.state()),
                         "the saved series do not belong to this deck or version; start the run again without --resume",
                         FileError);
    columns = record.columns();
    columns.back().values.push_back(1);  // ragged
    CHECK_THROWS_AS(record.restore(columns, record.state()), FileError);
    CHECK_THROWS_AS(record.restore(record.columns(), std::vector<double>(3)), FileError);
    CHECK_THROWS_AS(record.column("no_such_column"), std::out_of_range);
}

TEST_CASE("every column says its unit and what it is, and its name ends with the unit") {
    const Record record(played_deck());
    for (const Column& column : record.columns()) {
        CHECK_FALSE(column.unit.empty());
        CHECK_FALSE(column.description.empty());
        if (column.unit != "1" && column.unit != "%") CHECK(column.name.ends_with("_" + column.unit));
    }
}
