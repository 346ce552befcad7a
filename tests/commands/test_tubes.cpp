// SPDX-License-Identifier: MIT
// The decks that come with spokewright run, and the README's table of keys is what the program prints.
#include <doctest/doctest.h>

#include <fstream>
#include <iterator>
#include <nlohmann/json.hpp>
#include <string>

#include "tests/commands/command.hpp"

using namespace spokewright;

namespace {

std::string text_of(const std::string& path) {
    std::ifstream file(path);
    return {std::istreambuf_iterator<char>(file), {}};
}

}  // namespace

TEST_CASE("each deck in inputs/tubes runs for its first nanoseconds") {
    const ScratchFolder folder;
    int count = 0;
    for (const auto& entry : std::filesystem::directory_iterator(SPOKEWRIGHT_SOURCE_DIR "/inputs/tubes")) {
        const std::string deck = entry.path().string();
        CAPTURE(deck);
        REQUIRE(entry.path().extension() == ".ini");
        const std::string out = folder.file(entry.path().stem().string());
        const Outcome outcome =
            spokewright::spokewright(run_of(deck, out, {"--quiet", "--set", "clock.end_time_ns=2"}));
        CHECK(outcome.status == 0);
        CHECK(outcome.err == "");  // a deck to learn from warns of nothing
        const auto summary = nlohmann::json::parse(text_of(out + "/summary.json"));
        CHECK(summary.at("electrons") > 0);
        CHECK(summary.at("charge_imbalance_C") == 0.0);
        ++count;
    }
    CHECK(count >= 3);
}

TEST_CASE("the README shows the keys that the program knows") {
    const std::string readme = text_of(SPOKEWRIGHT_SOURCE_DIR "/README.md");
    const std::string begin = "<!-- keys -->";
    const std::size_t start = readme.find(begin);
    const std::size_t end = readme.find("<!-- /keys -->");
    REQUIRE(start != std::string::npos);
    REQUIRE(end != std::string::npos);
    const std::string table = readme.substr(start + begin.size(), end - start - begin.size());
    const Outcome keys = spokewright::spokewright({"keys", "--markdown"});
    // Blank lines around a table are the README's own.
    const std::size_t first = table.find_first_not_of('\n');
    REQUIRE(first != std::string::npos);
    CHECK(table.substr(first, table.find_last_not_of('\n') - first + 1) + "\n" == keys.out);
}
