// SPDX-License-Identifier: MIT
// How one value of a deck is read from its text: numbers, whole numbers, lists, choices; with units and ranges.
#pragma once

#include <cstdint>
#include <stdexcept>
#include <string>
#include <string_view>
#include <vector>

namespace spokewright {

/// What is wrong with a value and what is allowed, without the place; the deck reader adds file, line and key.
struct BadValue : std::runtime_error {
    using std::runtime_error::runtime_error;
};

struct Unit {
    const char* name;  // as in the key, "" for a pure number
    double to_si;
};

inline constexpr Unit kNoUnit{"", 1};

/// A closed range, or one that leaves out its lower end.
struct Range {
    double low;
    double high;
    bool open_low = false;
};

constexpr Range between(double low, double high) {
    return {low, high, false};
}
constexpr Range above(double low, double high) {
    return {low, high, true};
}

/// "0.1..0.9 mm", "above 0 to 1000 mm".
std::string range_text(const Range& range, const Unit& unit);

/// A finite decimal number in the unit of its key, returned in that unit; the same in every locale. Throws BadValue.
double read_real(std::string_view text, const Range& range, const Unit& unit);

/// A whole number. Throws BadValue.
std::int64_t read_integer(std::string_view text, std::int64_t low, std::int64_t high);

/// A whole number from 0 to 2^64 - 1. Throws BadValue.
std::uint64_t read_unsigned(std::string_view text);

/// The place of `text` in `choices`. Throws BadValue that lists them.
std::size_t read_choice(std::string_view text, const std::vector<std::string>& choices);

/// The items of a list separated by blanks or commas. Throws BadValue when there is none.
std::vector<std::string_view> list_items(std::string_view text);

}  // namespace spokewright
