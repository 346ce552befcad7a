// SPDX-License-Identifier: MIT
// The key table is complete, free of doubles, and printed in full.
#include "inputs/deck_keys.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <set>
#include <string>

using namespace spokewright;

TEST_CASE("every key stands once and says what it is") {
    std::set<std::string> names;
    for (const DeckKey& key : deck_keys()) {
        CAPTURE(key.full_name());
        CHECK(names.insert(key.full_name()).second);
        CHECK_FALSE(key.value.range.empty());
        CHECK_FALSE(key.preset.shown.empty());
        CHECK(key.meaning.ends_with('.'));
        CHECK((key.preset.resolve != nullptr) == (key.preset.shown != "required"));
    }
    CHECK(names.size() == 53);
}

TEST_CASE("sections stand together") {
    std::set<std::string> closed;
    std::string section;
    for (const DeckKey& key : deck_keys()) {
        if (key.section == section) continue;
        CHECK(closed.insert(key.section).second);
        section = key.section;
    }
    CHECK(closed == std::set<std::string>{"tube", "supply", "magnet", "cathode", "circuit", "load", "prime", "drive",
                                          "grid", "clock", "electrons", "output"});
}

TEST_CASE("a rival is a key above in the same section") {
    for (std::size_t i = 0; i < deck_keys().size(); ++i) {
        const DeckKey& key = deck_keys()[i];
        if (key.rival.empty()) continue;
        REQUIRE(i > 0);
        CHECK(deck_keys()[i - 1].section == key.section);
        CHECK(deck_keys()[i - 1].name == key.rival);
    }
}

TEST_CASE("the unit in a key's name is the unit of its value") {
    const auto unit_of = [](const std::string& name) {
        return std::ranges::find(deck_keys(), name, &DeckKey::name)->value.unit;
    };
    CHECK(unit_of("anode_radius_mm") == "mm");
    CHECK(unit_of("frequencies_GHz") == "GHz");
    CHECK(unit_of("capacitance_pF") == "pF");
    CHECK(unit_of("step_ps") == "ps");
    CHECK(unit_of("checkpoint_minutes") == "min");
    CHECK(unit_of("unloaded_Q").empty());
}

TEST_CASE("the nearest key") {
    CHECK(nearest_key("tube", "cathode_radius") == "tube.cathode_radius_mm");
    CHECK(nearest_key("", "vswr") == "load.vswr");
    CHECK(nearest_key("supply", "series_resistence_ohm") == "supply.series_resistance_ohm");
    CHECK(nearest_section("electron") == "electrons");
}

TEST_CASE("the printed table") {
    const std::string text = key_table_text();
    CHECK(
        text.starts_with("[tube]\n  name\n      Name of the tube, for headings.\n"
                         "      unit -; allowed: text, 1..80 bytes; default: unnamed tube\n"));
    CHECK(text.find("\n\n[supply]\n") != std::string::npos);
    for (const DeckKey& key : deck_keys()) CHECK(text.find("\n  " + key.name + "\n") != std::string::npos);
}

TEST_CASE("the Markdown table") {
    const std::string text = key_table_markdown();
    CHECK(text.starts_with("| key | unit | allowed | default | meaning |\n|---|---|---|---|---|\n"));
    CHECK(text.find(
              "| `tube.gap_share` | - | 0.1..0.9 | 0.4 | Gap between vane tips as a share of the vane pitch. |\n") !=
          std::string::npos);
    CHECK(std::ranges::count(text, '\n') == static_cast<std::ptrdiff_t>(deck_keys().size()) + 2);
    // Six bars a row: no cell may hold one.
    CHECK(std::ranges::count(text, '|') == 6 * (static_cast<std::ptrdiff_t>(deck_keys().size()) + 2));
}
