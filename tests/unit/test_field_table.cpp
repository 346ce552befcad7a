// SPDX-License-Identifier: MIT
#include "inputs/field_table.hpp"

#include <doctest/doctest.h>

#include <string>

#include "inputs/deck_reader.hpp"
#include "inputs/errors.hpp"
#include "tests/relative_error.hpp"
#include "tests/scratch_folder.hpp"

using namespace spokewright;

namespace {

constexpr double kRounding = 1e-14;  // a few roundings of sums and products near 1

std::string message_of(const std::string& table) {
    const ScratchFolder folder;
    const std::string path = folder.write("b.txt", table);
    try {
        read_field_table(path, 2e-3, 4.6e-3);
    } catch (const InputError& error) {
        return std::string(error.what()).substr(folder.path().string().size() + 1);
    }
    return "no error";
}

std::string deck_text(const std::string& magnet) {
    return "[tube]\ncathode_radius_mm = 2\nanode_radius_mm = 4\naxial_height_mm = 10\nvane_count = 0\n"
           "[supply]\nanode_voltage_V = 4000\n[magnet]\n" +
           magnet;
}

}  // namespace

TEST_CASE("a table is read in SI units, comments and commas allowed") {
    const ScratchFolder folder;
    const auto table =
        read_field_table(folder.write("b.txt", "# r_mm B_T\n1.5 0.2  # inner\r\n\n3, 0.18\n5\t0.1\n"), 2e-3, 4.6e-3);
    REQUIRE(table.size() == 3);
    CHECK(relative_error(table[1].radius, 3e-3) < kRounding);
    CHECK(table[1].field == 0.18);
    CHECK(table[2].field == 0.1);
}

TEST_CASE("faults of a table name the line") {
    CHECK(message_of("1 0.2\n3 0.2\n3 0.1\n") ==
          "b.txt:3: the radius does not rise; allowed: radii that rise from row to row");
    CHECK(message_of("1 0.2\n3\n") == "b.txt:2: 1 columns; allowed: two, the radius in mm and the field in T");
    CHECK(message_of("1 0.2\n3 0.2x\n") == "b.txt:2: \"0.2x\" is not a number; allowed: 0..10 T");
    CHECK(message_of("1 0.2\n3 nan\n") == "b.txt:2: nan is out of range; allowed: 0..10 T");
    CHECK(message_of("# none\n1 0.2\n") == "b.txt: 1 rows; allowed: two or more of radius in mm and field in T");
    CHECK(message_of("#\n2.5 0.2\n5 0.2\n") ==
          "b.txt:2: covers 2.5..5 mm; allowed: a table from cathode to anode, 2..4.6 mm");
    CHECK(message_of("#\n2 0.2\n4.5 0.2\n") ==
          "b.txt:3: covers 2..4.5 mm; allowed: a table from cathode to anode, 2..4.6 mm");
    CHECK(message_of(std::string("1 0.2\n\0", 7)) == "b.txt:2: not plain text: byte 0x00; allowed: UTF-8 text");
    CHECK_THROWS_WITH_AS(read_field_table("no/b.txt", 1, 2), "no/b.txt: cannot be read: No such file or directory",
                         FileError);
}

TEST_CASE("a deck names its table from its own folder") {
    const ScratchFolder folder;
    folder.write("b.txt", "2 0.2\n4 0.1\n");
    const Deck deck = read_deck(folder.write("tube.ini", deck_text("field_table = b.txt\n")), {});
    REQUIRE(deck.magnet.table.size() == 2);
    CHECK(deck.magnet.table[0].field == 0.2);
    CHECK(deck.resolved_text.find("\nfield_table = b.txt\n# field_T: not in force\n") != std::string::npos);
}

TEST_CASE("a table and a uniform field are not given together") {
    const ScratchFolder folder;
    folder.write("b.txt", "2 0.2\n4 0.1\n");
    const std::string path = folder.write("tube.ini", deck_text("field_T = 0.2\nfield_table = b.txt\n"));
    CHECK_THROWS_WITH_AS(
        read_deck(path, {}),
        (path + ":9: magnet.field_T: given beside field_table; allowed: field_T or field_table, not both").c_str(),
        InputError);
}

TEST_CASE("the mean field is weighted with the area") {
    Deck deck;
    deck.tube.cathode_radius = 2e-3;
    deck.tube.anode_radius = 4e-3;
    deck.magnet.field = 0.2;
    deck.magnet.field_scale = 1.5;
    CHECK(relative_error(mean_field(deck), 0.3) < kRounding);

    // B = b r over the whole table: the mean is 2 b (r_a^3 - r_c^3) / (3 (r_a^2 - r_c^2)).
    deck.magnet.table = {{1e-3, 0.05}, {3e-3, 0.15}, {5e-3, 0.25}};
    const double expected = 1.5 * 2 * 50 * (64e-9 - 8e-9) / (3 * (16e-6 - 4e-6));
    CHECK(relative_error(mean_field(deck), expected) < kRounding);

    // B = 0.3 T - b r: the constant part is its own mean.
    deck.magnet.table = {{1e-3, 0.25}, {3e-3, 0.15}, {5e-3, 0.05}};
    CHECK(relative_error(mean_field(deck), 1.5 * 0.3 - expected) < kRounding);
}
