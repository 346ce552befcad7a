// SPDX-License-Identifier: MIT
#include "diagnostics/chart_text.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>
#include <string>

#include "diagnostics/chart_rows.hpp"
#include "tests/unit/small_deck.hpp"

using namespace spokewright;

namespace {

Chart chart_of(const std::string& text, const std::vector<std::string>& overrides = {}) {
    Deck deck = read_text(text, overrides);
    deck.path = "tube.ini";
    return operating_chart(deck);
}

std::string joined(const std::vector<std::string>& lines) {
    std::string text;
    for (const std::string& line : lines) text += line + '\n';
    return text;
}

const std::string kExpected = R"(Operating chart of unnamed tube (tube.ini)

Point                                  value   non-rel.
  anode voltage                         4150            V
  magnetic field                         175            mT
  cathode radius                           2            mm
  anode radius                           4.6            mm      to the vane tips
  axial height                            10            mm

Cutoff
  cyclotron frequency                 4.8987            GHz [1] e B / (2 pi m)
  Hull voltage                        9285.4     9369.7 V   [2] the anode voltage is 44.7 % of it
  Hull field at the anode voltage      116.7     116.47 mT  [2] the field is 1.5 times as strong

Brillouin hub at the point
  hub radius                           2.604            mm  [3] the hub fills 23.2 % of the gap
  drift at the hub's edge         1.6411e+07            m/s [3] turns 2.05 times as fast as the wave
  charge of the hub                   3.3073            nC  [3] over the axial height; negative

Pi mode: normal form
  cold frequency                        2.45            GHz     mode 5
  V0, synchronous voltage             571.14     570.19 V   [5] V / V0 = 7.27
  B0, synchronous field               43.218      43.17 mT  [5] B / B0 = 4.05

Anode voltages at which only the pi mode can start
  lower edge: Hartree, pi mode        4052.3            V   [5]
  upper edge                          8702.6            V   [5] Hartree voltage of mode 3
  the voltage may fall by               2.36            %       of itself, to the lower edge
  the voltage may rise by             109.70            %       of itself, to the upper edge
  upper edge, space harmonics too     4990.9            V   [5] Hartree voltage of mode 3, m = -7
  the voltage may then rise by         20.26            %       at or below the lower edge: mode 3,
                                                                m = 13 from 2921 V

Efficiency in the pi mode
  electronic, drift only               86.24            %   [5] 1 - V0 / V: never more than this
  electronic, mean cycloid             72.48            %   [5] 1 - 2 V0 / V
  of the circuit                       89.98            %   [6] Q_L / Q_ext in the deck's load
  in total, drift only                 77.60            %   [5] drift only times circuit
  loaded Q                            150.27                [6] in the deck's load
  pulling figure                      6.1128            MHz [6] VSWR 1.5, all phases

Currents
  space-charge limit without field    23.482     23.506 A   [4] a diode at the anode voltage
  anode current expected              1.6206            A   [9] 20 % of the hub a period, roughly
  primary emission of cathode              -                    no limit: emission = space_charge

How far the model's assumptions hold
  omega r_a / c, pi mode              0.2362                [8] static fields off by about 0.23 %
  pi wave at r_a, v / c              0.04724
  electron at full voltage, v / c    0.12668
  electron at full voltage, gamma     1.0081

Every mode and its first space harmonics, m = n + k N [5]
   n   k    m    f, GHz     V0, V    B0, mT Hartree, V  above it
   3   0    3       4.4    5186.3    130.53     8702.6   -52.3 %  non-rel. V0 5108.4, B0 129.22,
                                                                  Hartree 8728.4
   3  -1   -7       4.4    940.87    55.481     4990.9   -16.8 %  non-rel. V0 938.28, B0 55.379
   3   1   13       4.4    272.26    29.835       2921   +42.1 %
   5   0    5      2.45    571.14    43.218     4052.3    +2.4 %  non-rel. V0 570.19, B0 43.17
   5   1   15      2.45    63.366    14.392     1477.6  +180.9 %
  above it: the anode voltage over the threshold. Harmonics with m < 0 turn against their mode's own
  wave; the electrons meet them in the wave that turns the other way.

)";

}  // namespace

TEST_CASE("the table of a small deck, to the letter") {
    const std::string text = joined(chart_lines(chart_of(kSmallDeck + kCircuit)));
    CHECK(text.substr(0, text.find("Sources.")) == kExpected);
    CHECK(text.find("  [2] A. W. Hull, Phys. Rev. 18, 31 (1921); relativistic") != std::string::npos);
    CHECK(text.find("local codes and licensed practice") != std::string::npos);
}

TEST_CASE("no line is wider than 100 columns or ends in a blank") {
    const std::string long_name = "tube.name=" + std::string(40, 'x') + " " + std::string(39, 'y');
    const std::vector<Chart> charts = {
        chart_of(kSmallDeck, {long_name}), chart_of(kSmallDeck + kCircuit, {"magnet.field_T=0"}),
        chart_of(kSmallDeck + kCircuit, {"magnet.field_T=9", "supply.anode_voltage_V=1e6"}),
        chart_of(kSmallDeck + kCircuit, {"circuit.frequencies_GHz=20 2.45", "tube.cathode_radius_mm=4.5"}),
        chart_of(kSmallDeck + kCircuit, {"circuit.frequencies_GHz=1.4 2.45"})};
    for (const Chart& chart : charts) {
        for (const std::string& line : chart_lines(chart)) {
            CAPTURE(line);
            CHECK(line.size() <= 100);
            CHECK((line.empty() || line.back() != ' '));
            CHECK(line.find("nan") == std::string::npos);
            CHECK(line.find("inf") == std::string::npos);
        }
    }
}

TEST_CASE("JSON holds every number of the table, null where there is none") {
    for (const std::vector<std::string>& overrides : {std::vector<std::string>{}, {"magnet.field_T=0"}}) {
        const Chart chart = chart_of(kSmallDeck + kCircuit, overrides);
        const auto json = nlohmann::json::parse(chart_json_text(chart));
        const std::string text = joined(chart_lines(chart));
        const auto rows = chart_rows(chart);
        CHECK(json.at("rows").size() == rows.size());
        for (const ChartRow& row : rows) {
            CAPTURE(row.key);
            const auto& value = json.at("rows").at(row.key).at("value");
            CHECK(value.is_null() == !std::isfinite(row.value));
            // The line of this label shows this value.
            const std::size_t at = text.find("\n  " + row.label);
            REQUIRE(at != std::string::npos);
            const std::string line = text.substr(at + 3, text.find('\n', at + 3) - at - 3);
            const bool percent = std::string(row.unit) == "%";
            char fixed[40] = "-";
            if (percent && !value.is_null()) std::snprintf(fixed, sizeof fixed, "%.2f", value.get<double>());
            const std::string shown = percent || value.is_null() ? fixed : figure(value.get<double>());
            CHECK(line.substr(32, 10).find(shown) != std::string::npos);
            const auto& other = json.at("rows").at(row.key).at("nonrelativistic");
            CHECK((other.is_null() || line.substr(43, 10).find(percent ? "." : figure(other)) != std::string::npos));
        }
        REQUIRE(json.at("waves").size() == chart.waves.size());
        CHECK(json.at("waves")[1].at("harmonic") == -7);
        CHECK(json.at("waves")[1].at("hartree_voltage_V").is_null() == !overrides.empty());
    }
}
