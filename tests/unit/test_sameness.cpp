// SPDX-License-Identifier: MIT
// The same run to the last bit: on any number of threads, on any instruction set, and after a restart. The heating tube
// through its rise and into its hub, 2000 steps.
#include <doctest/doctest.h>

#include "inputs/deck_reader.hpp"
#include "inputs/digest.hpp"
#include "tests/coarse_tube.hpp"

using namespace spokewright;

namespace {

constexpr int kSteps = 2000;

Deck heating_tube() {
    return read_deck(SPOKEWRIGHT_SOURCE_DIR "/inputs/tubes/heating.ini",
                     {"magnet.self_field=yes", "drive.available_power_W=1000"});
}

std::string hash_of(const InteractionSpace& space) {
    return sha256_hex(bytes_of(space.save()));
}

std::string hash_after_run(int threads, InstructionSet set) {
    InteractionSpace space(heating_tube(), threads, set);
    for (int k = 0; k < kSteps; ++k) {
        space.step();
    }
    CHECK(space.tally().electrons > 5000);
    return hash_of(space);
}

const std::string& expected() {
    static const std::string hash = hash_after_run(1, fastest_instruction_set());
    return hash;
}

}  // namespace

TEST_CASE("1, 2, 3, 4 and 8 threads end in the same state") {
    for (const int threads : {2, 3, 4, 8}) {
        CAPTURE(threads);
        CHECK(hash_after_run(threads, fastest_instruction_set()) == expected());
    }
}

TEST_CASE("every instruction set ends in the same state") {
    for (const InstructionSet set : instruction_sets()) {
        CAPTURE(name_of(set));
        CHECK(hash_after_run(1, set) == expected());
    }
}

TEST_CASE("a run restored at half way ends in the same state") {
    InteractionSpace first(heating_tube());
    for (int k = 0; k < kSteps / 2; ++k) {
        first.step();
    }
    InteractionSpace second(heating_tube(), 2);
    second.restore(first.save());
    for (int k = kSteps / 2; k < kSteps; ++k) {
        second.step();
    }
    CHECK(hash_of(second) == expected());
}

TEST_CASE("another seed ends elsewhere") {
    Deck deck = heating_tube();
    ++deck.electrons.seed;
    InteractionSpace space(deck);
    for (int k = 0; k < kSteps; ++k) {
        space.step();
    }
    CHECK(hash_of(space) != expected());
}
