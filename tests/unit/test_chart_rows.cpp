// SPDX-License-Identifier: MIT
#include "diagnostics/chart_rows.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <set>
#include <string_view>

#include "tests/relative_error.hpp"
#include "tests/unit/small_deck.hpp"

using namespace spokewright;

namespace {

std::vector<ChartRow> rows_of(const std::vector<std::string>& overrides = {},
                              const std::string& text = kSmallDeck + kCircuit) {
    return chart_rows(operating_chart(read_text(text, overrides)));
}

ChartRow row(const std::vector<ChartRow>& rows, std::string_view key) {
    const auto found = std::ranges::find(rows, key, [](const ChartRow& r) { return std::string_view(r.key); });
    REQUIRE(found != rows.end());
    return *found;
}

}  // namespace

TEST_CASE("figures: five of them, in full up to ten million") {
    CHECK(figure(4150) == "4150");
    CHECK(figure(0.0472403) == "0.04724");
    CHECK(figure(99999.4) == "99999");
    CHECK(figure(612290.4) == "612290");
    CHECK(figure(1.64108e7) == "1.6411e+07");
    CHECK(figure(-0.5) == "-0.5");
    CHECK(figure(std::nan("")) == "-");
}

TEST_CASE("the other value stands from 0.1 % on") {
    CHECK(std::isnan(nonrelativistic_worth_showing({1, 1.0009})));
    CHECK(nonrelativistic_worth_showing({1, 1.0011}) == 1.0011);
    CHECK(nonrelativistic_worth_showing({1, 0.9989}) == 0.9989);
    CHECK(std::isnan(nonrelativistic_worth_showing({std::nan(""), 1})));
}

TEST_CASE("keys are unique, and so is their order, whatever the deck lacks") {
    std::vector<std::string> order;
    for (const ChartRow& r : rows_of()) order.push_back(r.key);
    CHECK(std::set<std::string>(order.begin(), order.end()).size() == order.size());
    for (const auto& rows : {rows_of({}, kSmallDeck), rows_of({"magnet.field_T=0"}), rows_of({"magnet.field_T=0.1"})}) {
        std::vector<std::string> same;
        for (const ChartRow& r : rows) same.push_back(r.key);
        CHECK(same == order);
    }
}

TEST_CASE("a row without a number says why") {
    const std::vector<std::vector<ChartRow>> charts = {rows_of({}, kSmallDeck),
                                                       rows_of({"tube.vane_count=0"}, kSmallDeck),
                                                       rows_of({"magnet.field_T=0"}),
                                                       rows_of({"magnet.field_T=0.042"}),
                                                       rows_of({"supply.anode_voltage_V=500"}),
                                                       rows_of({"circuit.frequencies_GHz=1.4 2.45"})};
    for (const auto& rows : charts) {
        for (const ChartRow& r : rows) {
            CAPTURE(r.key);
            CHECK((std::isfinite(r.value) || !r.note.empty()));
            CHECK(r.note.find("nan") == std::string::npos);
            CHECK(r.source >= 0);
            CHECK(r.source <= static_cast<int>(chart_sources().size()));
        }
    }
}

TEST_CASE("distances to the edges are shares of the anode voltage") {
    const auto rows = rows_of();
    const double low = row(rows, "hartree_voltage_V").value;
    const double high = row(rows, "window_high_V").value;
    CHECK(relative_error(row(rows, "window_fall_percent").value, 100 * (1 - low / 4150)) < 1e-12);
    CHECK(relative_error(row(rows, "window_rise_percent").value, 100 * (high / 4150 - 1)) < 1e-12);
    CHECK(row(rows_of({"supply.anode_voltage_V=4000"}), "window_fall_percent").note ==
          "below the window: raise the voltage");
    CHECK(row(rows_of({"supply.anode_voltage_V=9000"}), "window_rise_percent").note ==
          "above the window: lower the voltage");
    CHECK(row(rows_of({"circuit.frequencies_GHz=1.4 2.45"}), "window_high_V")
              .note.starts_with("none: other modes start lower: mode 3 from "));
}

TEST_CASE("the cathode against the current expected") {
    const auto rows = rows_of({"cathode.emission=thermionic"});
    const double times = row(rows, "cathode_supply_A").value / row(rows, "expected_current_A").value;
    CHECK(times > 0.1);
    CHECK(row(rows, "cathode_supply_A").note == "0.887 times the current expected");
    CHECK(relative_error(times, 0.887) < 1e-3);  // three figures
    CHECK(row(rows_of({"cathode.emission=thermionic", "cathode.secondary_emission=yes"}), "cathode_supply_A").note ==
          "0.887 times the current expected; secondaries add to it");
    CHECK(row(rows_of(), "cathode_supply_A").note == "no limit: emission = space_charge");
}
