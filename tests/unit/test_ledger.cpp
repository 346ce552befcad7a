// SPDX-License-Identifier: MIT
#include <doctest/doctest.h>

#include <cmath>
#include <initializer_list>
#include <string>
#include <utility>
#include <vector>

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

TEST_CASE("each term stands on its side of the books") {
    PlayedRun run;
    Record record(run.deck);
    run.play(record, 0.04e-9);  // one row
    const std::vector<std::pair<std::string, double>> terms = {
        {"supply_energy_J", 1},  {"prime_energy_J", 10},        {"drive_energy_J", 1000},   {"emission_energy_J", 100},
        {"wall_loss_J", 2},      {"load_energy_J", 20},         {"anode_energy_J", 200},    {"cathode_energy_J", 2000},
        {"kinetic_energy_J", 3}, {"space_charge_energy_J", 30}, {"resonator_energy_J", 300}};
    auto columns = record.columns();
    for (Column& column : columns) {
        for (const auto& [name, value] : terms) {
            if (column.name == name) column.values = {value};
        }
    }
    record.restore(columns, record.state());
    const EnergyBalance balance = energy_balance(record);
    CHECK(balance.in == 1111);
    CHECK(balance.out == 2222);
    CHECK(balance.stored_change == 333);
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
