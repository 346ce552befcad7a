// SPDX-License-Identifier: MIT
// The one table of every deck key. It feeds the deck reader, `spokewright keys`, the resolved deck and the README.
#pragma once

#include <functional>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "inputs/deck.hpp"

namespace spokewright {

/// What a key takes: its unit, its range in words and the way its text enters a deck in SI units.
/// `read` sees a deck filled by all keys above its own in the table; it throws BadValue.
struct KeyValue {
    std::string unit;  // "" for none
    std::string range;
    std::function<void(Deck&, std::string_view)> read;
};

/// What holds when a key is not given. `resolve` returns the text in force, which is read like a given one; nothing
/// when the key is not in force in this deck; it throws BadValue when the key must be given.
struct KeyDefault {
    std::string shown;
    std::function<std::optional<std::string>(const Deck&)> resolve;
};

struct DeckKey {
    std::string section;
    std::string name;
    KeyValue value;
    KeyDefault preset;
    std::string meaning;
    std::string rival;  // a key above this one, in the same section, that may not be given beside it; "" = none

    [[nodiscard]] std::string full_name() const { return section + '.' + name; }
};

/// Every key, in the order in which they are read.
const std::vector<DeckKey>& deck_keys();

/// The known `section.key` nearest to an unknown one, by edit distance.
std::string nearest_key(std::string_view section, std::string_view name);

/// The known section nearest to an unknown one.
std::string nearest_section(std::string_view section);

/// The table for a terminal: key, default, range and meaning, by section.
std::string key_table_text();

/// The same as a Markdown table.
std::string key_table_markdown();

}  // namespace spokewright
