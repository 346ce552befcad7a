// SPDX-License-Identifier: MIT
// Random bytes and small damage to a good deck: the reader may refuse it, with a message in printable ASCII, and do
// nothing else.
#include <doctest/doctest.h>

#include <algorithm>
#include <fstream>
#include <iterator>
#include <random>
#include <string>

#include "inputs/deck_reader.hpp"
#include "inputs/errors.hpp"
#include "tests/scratch_folder.hpp"

using namespace spokewright;

namespace {

// Plain modulo: the standard's distributions differ between libraries, and an even spread does not matter here.
std::size_t below(std::mt19937& random, std::size_t limit) {
    return random() % limit;
}

bool refused(const ScratchFolder& folder, const std::string& text) {
    const std::string path = folder.write("noise.ini", text);
    try {
        read_deck(path, {});
    } catch (const InputError& error) {
        const std::string message = error.what();
        CHECK(message.size() < 600);
        CHECK(std::ranges::all_of(message, [](char c) { return c >= ' ' && c <= '~'; }));
        return true;
    } catch (const FileError&) {  // a damaged key may have become field_table
        return true;
    }
    return false;
}

std::string heating_deck() {
    std::ifstream file(SPOKEWRIGHT_SOURCE_DIR "/inputs/tubes/heating.ini");
    return {std::istreambuf_iterator<char>(file), {}};
}

void damage(std::string& text, std::mt19937& random) {
    static const std::string kPieces[] = {"[", "]", "=", "#", "\n", "\r", ",", ":", ".", "e", "-", "9", "\x7f", "\xff"};
    const std::size_t at = below(random, text.size());
    switch (below(random, 4)) {
        case 0:
            text[at] = static_cast<char>(below(random, 256));
            break;
        case 1:
            text.insert(at, kPieces[below(random, std::size(kPieces))]);
            break;
        case 2:
            text.erase(at, 1 + below(random, 40));
            break;
        default:
            text.insert(at, text.substr(below(random, text.size()), 60));
            break;
    }
}

}  // namespace

TEST_CASE("ten kilobytes of random bytes are refused") {
    const ScratchFolder folder;
    std::mt19937 random(1);
    for (int round = 0; round < 50; ++round) {
        std::string bytes(10'000, '\0');
        for (char& c : bytes) c = static_cast<char>(random());
        CHECK(refused(folder, bytes));
    }
}

TEST_CASE("random printable lines are refused") {
    const ScratchFolder folder;
    std::mt19937 random(2);
    for (int round = 0; round < 50; ++round) {
        std::string text = "[tube]\n";
        for (int i = 0; i < 2000; ++i)
            text += below(random, 20) == 0 ? '\n' : static_cast<char>(' ' + below(random, 95));
        CHECK(refused(folder, text));
    }
}

TEST_CASE("a damaged deck is read or refused") {
    const ScratchFolder folder;
    const std::string deck = heating_deck();
    REQUIRE_FALSE(refused(folder, deck));
    std::mt19937 random(3);
    int count = 0;
    for (int round = 0; round < 2000; ++round) {
        std::string text = deck;
        for (std::size_t i = 0; i <= below(random, 4); ++i) damage(text, random);
        if (refused(folder, text)) ++count;
    }
    CHECK(count > 500);   // most damage outside the comments is seen
    CHECK(count < 2000);  // damage to a comment is none
}
