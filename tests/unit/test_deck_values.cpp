// SPDX-License-Identifier: MIT
// Numbers, whole numbers and lists as text.
#include "inputs/deck_values.hpp"

#include <doctest/doctest.h>

#include <clocale>
#include <string>
#include <vector>

#include "tests/relative_error.hpp"
#include "tests/unit/small_deck.hpp"

using namespace spokewright;

TEST_CASE("numbers are read the same under a locale with a decimal comma") {
    const std::string before = std::setlocale(LC_ALL, nullptr);
    for (const char* name : {"de_DE.UTF-8", "fr_FR.UTF-8"}) std::setlocale(LC_ALL, name);  // where it is installed
    CHECK(relative_error(read_text(kSmallDeck).tube.anode_radius, 4.6e-3) < kRounding);
    std::setlocale(LC_ALL, before.c_str());
}

TEST_CASE("bad numbers") {
    const std::string place = "tube.ini:3: tube.anode_radius_mm: ";
    const auto message = [&](const std::string& value) { return message_of(replaced(kSmallDeck, "4.6", value)); };
    CHECK(message("4,6") == place + "\"4,6\" is not a number; allowed: above 0 to 1000 mm");
    CHECK(message("4.6 mm") == place + "\"4.6 mm\" is not a number; allowed: above 0 to 1000 mm");
    CHECK(message("") == place + "\"\" is not a number; allowed: above 0 to 1000 mm");
    CHECK(message("nan") == place + "nan is out of range; allowed: above 0 to 1000 mm");
    CHECK(message("inf") == place + "inf is out of range; allowed: above 0 to 1000 mm");
    CHECK(message("1e999") == place + "1e999 is out of range; allowed: above 0 to 1000 mm");
    CHECK(message("-4.6") == place + "-4.6 is out of range; allowed: above 0 to 1000 mm");
    CHECK(message("4600") == place + "4600 is out of range; allowed: above 0 to 1000 mm");
    CHECK(message("4.6\xC3\xA9") == place + "\"4.6\\xc3\\xa9\" is not a number; allowed: above 0 to 1000 mm");
    CHECK(message("+4.6") == "no error");
    CHECK(override_message("tube.vane_count=3") ==
          "--set tube.vane_count=3: tube.vane_count: 3 vanes; allowed: 0 (smooth bore) or 4..60");
    CHECK(override_message("tube.vane_count=9.5") ==
          "--set tube.vane_count=9.5: tube.vane_count: \"9.5\" is not a whole number; "
          "allowed: a whole number, 0..60");
    CHECK(override_message("electrons.seed=-1").ends_with("allowed: a whole number, 0..18446744073709551615"));
    CHECK(override_message("magnet.self_field=true") ==
          "--set magnet.self_field=true: magnet.self_field: \"true\" is not a choice; allowed: yes, no");
}

TEST_CASE("ranges are closed unless they say above") {
    CHECK(read_real("0", between(0, 1), kNoUnit) == 0);
    CHECK(read_real("1", above(0, 1), kNoUnit) == 1);
    CHECK_THROWS_WITH_AS(read_real("0", above(0, 1), kNoUnit), "0 is out of range; allowed: above 0 to 1", BadValue);
    CHECK(range_text(between(0.1, 0.9), kNoUnit) == "0.1..0.9");
    CHECK(range_text(above(0, 1000), Unit{"mm", 1e-3}) == "above 0 to 1000 mm");
}

TEST_CASE("whole numbers keep every digit") {
    CHECK(read_unsigned("18446744073709551615") == 18446744073709551615ULL);
    CHECK_THROWS_AS(read_unsigned("18446744073709551616"), BadValue);
    CHECK(read_integer("-3", -3, 3) == -3);
    CHECK_THROWS_AS(read_integer("+-3", -3, 3), BadValue);
}

TEST_CASE("lists are separated by blanks, commas or both") {
    CHECK(list_items(" 1, 2\t3 ,4") == std::vector<std::string_view>{"1", "2", "3", "4"});
    CHECK_THROWS_AS(list_items(" , "), BadValue);
}
