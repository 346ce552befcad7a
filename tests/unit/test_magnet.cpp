// SPDX-License-Identifier: MIT
// Source: Ampere's law; a sheet, a thick winding and a hub stand in tests/published/test_self_field.cpp. Here: the
// applied field, and how applied and self field go together.
#include <doctest/doctest.h>

#include <cmath>
#include <vector>

#include "fields/magnet.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

constexpr double kRounding = 1e-14;
const PolarGrid kGrid{2e-3, 4e-3, 10e-3, 8, 8};  // rows 0.25 mm apart

MagnetSettings uniform(double field, double scale) {
    MagnetSettings settings;
    settings.field = field;
    settings.field_scale = scale;
    return settings;
}

/// A sheet of current in one row, A/m.
std::vector<double> sheet(std::size_t row, double current) {
    std::vector<double> rows(9, 0.0);
    rows[row] = current;
    return rows;
}

}  // namespace

TEST_CASE("a uniform field stands in every row, times its scale") {
    const Magnet magnet(uniform(0.2, 1.5), kGrid);
    REQUIRE(magnet.field().size() == 9);
    for (const double field : magnet.field()) CHECK(relative_error(field, 0.3) < kRounding);
    for (const double field : magnet.self_field()) CHECK(field == 0);
}

TEST_CASE("a table is exact at its samples and linear between, times its scale; the uniform field is unused") {
    MagnetSettings settings = uniform(9, 2);
    settings.table = {{1e-3, 0.05}, {2.5e-3, 0.20}, {3.5e-3, 0.10}, {5e-3, 0.13}};
    const Magnet magnet(settings, kGrid);
    const std::vector<double> expected{0.15, 0.175, 0.20, 0.175, 0.15, 0.125, 0.10, 0.105, 0.11};
    for (std::size_t i = 0; i < 9; ++i) CHECK(relative_error(magnet.field()[i], 2 * expected[i]) < 10 * kRounding);
}

TEST_CASE("a table that begins at the cathode and ends at the anode gives its end values there") {
    MagnetSettings settings;
    settings.table = {{2e-3, 0.1}, {4e-3, 0.2}};
    const Magnet magnet(settings, kGrid);
    CHECK(relative_error(magnet.field().front(), 0.1) < kRounding);
    CHECK(relative_error(magnet.field()[4], 0.15) < 10 * kRounding);
    CHECK(relative_error(magnet.field().back(), 0.2) < kRounding);
}

TEST_CASE("a new current replaces the old one") {
    Magnet magnet(uniform(0.2, 1), kGrid);
    magnet.set_self_field(sheet(6, -9000));
    magnet.set_self_field(sheet(3, -5000));
    for (std::size_t i = 0; i < 9; ++i) {
        const double inside = i < 3 ? 1 : i == 3 ? 0.5 : 0;
        CHECK(relative_error(magnet.self_field()[i], -inside * kVacuumPermeability * 5000) < kRounding);
        CHECK(relative_error(magnet.field()[i], 0.2 - inside * kVacuumPermeability * 5000) < kRounding);
    }
}

TEST_CASE("two sheets add") {
    Magnet magnet(uniform(0.2, 1), kGrid);
    std::vector<double> both = sheet(6, -9000);
    both[3] = 4000;
    magnet.set_self_field(both);
    CHECK(relative_error(magnet.self_field()[0], kVacuumPermeability * (4000 - 9000)) < kRounding);
    CHECK(relative_error(magnet.self_field()[5], kVacuumPermeability * -9000) < kRounding);
    CHECK(magnet.self_field()[8] == 0);
}

TEST_CASE("the share is the largest over the rows, without sign, against the applied field of the same row") {
    MagnetSettings settings;
    settings.table = {{2e-3, 0.1}, {4e-3, 0.3}};
    Magnet magnet(settings, kGrid);
    CHECK(magnet.self_field_share() == 0);
    magnet.set_self_field(sheet(5, -5000));
    CHECK(relative_error(magnet.self_field_share(), kVacuumPermeability * 5000 / 0.1) < kRounding);
}

TEST_CASE("without an applied field there is no share to speak of") {
    Magnet magnet(uniform(0, 1), kGrid);
    magnet.set_self_field(sheet(5, -5000));
    CHECK(magnet.self_field_share() == 0);
    CHECK(relative_error(magnet.field()[0], -kVacuumPermeability * 5000) < kRounding);
}

TEST_CASE("a restored self field gives the same total to the last bit") {
    Magnet saved(uniform(0.2, 1), kGrid), restored(uniform(0.2, 1), kGrid);
    saved.set_self_field(std::vector<double>{-1, 2000, -3000.3, 4, -5, 600.7, -7000, 8, -9});
    restored.set_self_field(sheet(2, 1e6));
    restored.restore_self_field(saved.self_field());
    for (std::size_t i = 0; i < 9; ++i) {
        CHECK(restored.field()[i] == saved.field()[i]);
        CHECK(restored.self_field()[i] == saved.self_field()[i]);
    }
    CHECK(restored.self_field_share() == saved.self_field_share());
}
