// SPDX-License-Identifier: MIT
// The key table as people read it, and the search for the key that somebody meant.
#include <fmt/format.h>

#include <algorithm>
#include <numeric>

#include "inputs/deck_keys.hpp"

namespace spokewright {

namespace {

constexpr std::size_t kLongestKey = 80;  // more letters than any key: what is beyond cannot make it nearer

// Levenshtein's edit distance, one row of the table at a time. V. I. Levenshtein, Sov. Phys. Dokl. 10, 707 (1966).
std::size_t edit_distance(std::string_view a, std::string_view b) {
    a = a.substr(0, kLongestKey);
    std::vector<std::size_t> row(b.size() + 1);
    std::iota(row.begin(), row.end(), std::size_t{0});
    for (std::size_t i = 0; i < a.size(); ++i) {
        std::size_t diagonal = row[0]++;
        for (std::size_t j = 0; j < b.size(); ++j) {
            const std::size_t replaced = diagonal + (a[i] == b[j] ? 0 : 1);
            diagonal = row[j + 1];
            row[j + 1] = std::min({replaced, row[j] + 1, row[j + 1] + 1});
        }
    }
    return row.back();
}

std::string unit_or_dash(const DeckKey& key) {
    return key.value.unit.empty() ? "-" : key.value.unit;
}

}  // namespace

std::string nearest_key(std::string_view section, std::string_view name) {
    // The right name in the wrong section is nearer than a wrong name in the right one.
    const auto distance = [&](const DeckKey& key) {
        return 2 * edit_distance(name, key.name) + (key.section == section ? 0 : 1);
    };
    return std::ranges::min_element(deck_keys(), {}, distance)->full_name();
}

std::string nearest_section(std::string_view section) {
    const auto distance = [&](const DeckKey& key) { return edit_distance(section, key.section); };
    return std::ranges::min_element(deck_keys(), {}, distance)->section;
}

std::string key_table_text() {
    std::string text;
    std::string section;
    for (const DeckKey& key : deck_keys()) {
        if (key.section != section) text += fmt::format("{}[{}]\n", section.empty() ? "" : "\n", key.section);
        section = key.section;
        text += fmt::format("  {}\n      {}\n      unit {}; allowed: {}; default: {}\n", key.name, key.meaning,
                            unit_or_dash(key), key.value.range, key.preset.shown);
    }
    return text;
}

std::string key_table_markdown() {
    std::string text = "| key | unit | allowed | default | meaning |\n|---|---|---|---|---|\n";
    for (const DeckKey& key : deck_keys()) {
        text += fmt::format("| `{}` | {} | {} | {} | {} |\n", key.full_name(), unit_or_dash(key), key.value.range,
                            key.preset.shown, key.meaning);
    }
    return text;
}

}  // namespace spokewright
