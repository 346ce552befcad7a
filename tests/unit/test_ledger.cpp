// SPDX-License-Identifier: MIT
#include <doctest/doctest.h>

#include <cmath>
#include <initializer_list>

#include "diagnostics/ledger.hpp"
#include "tests/played_run.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

TEST_CASE("a closed ledger is closed, an open one shows what is lost") {
    for (const double lost : {0.0, 0.004}) {
        PlayedRun run;
        run.lost_energy = lost;
        Record record(run.deck);
        run.play(record, 4e-9);
        const double rounding = 1e-12;  // of sums over 2000 steps
        CHECK(std::abs(energy_balance(record).imbalance() - lost) < rounding);
        CHECK(std::abs(energy_balance(record, 20, 80).imbalance() - lost) < rounding);
        const double window = (80 - 20) * 16 * 2e-12;
        CHECK(relative_error(energy_balance(record, 20, 80).in, 1.5 * 4200 * window) < rounding);
        CHECK_THROWS_AS(energy_balance(record, 20, 100000), std::out_of_range);
    }
}

TEST_CASE("what is stored counts: a change inside a window balances its input") {
    PlayedRun run;
    Record record(run.deck);
    run.play(record, 0.1e-9);
    auto columns = record.columns();
    for (Column& column : columns) {
        if (column.name == "kinetic_energy_J") column.values = {1e-9, 2e-9, 4e-9};
        if (column.name == "space_charge_energy_J") column.values = {1e-9, 1e-9, 2e-9};
        if (column.name == "resonator_energy_J") column.values = {0, 1e-9, 5e-9};
    }
    record.restore(columns, record.state());
    CHECK(relative_error(energy_balance(record, 0, 2).stored_change, 9e-9) < 1e-12);
    CHECK(relative_error(energy_balance(record).stored_change, 11e-9) < 1e-12);
}

TEST_CASE("an empty record balances, and a gain from nothing is an infinite fault") {
    CHECK(energy_balance(Record(played_deck())).imbalance() == 0);
    CHECK(std::isinf(EnergyBalance{0, 1, 0}.imbalance()));
}

TEST_CASE("an electron astray shows as its charge, for good") {
    PlayedRun run;
    Record record(run.deck);
    run.play(record, 0.1e-9);
    CHECK(charge_imbalance(record, -1e-14) == 0);
    run.stray_electrons = -3;
    run.play(record, 0.2e-9);
    run.stray_electrons = 0;
    run.play(record, 0.3e-9);
    CHECK(relative_error(charge_imbalance(record, -1e-14), 3e-14) < 1e-12);
}
