// SPDX-License-Identifier: MIT
#include "inputs/deck_values.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <charconv>
#include <cmath>
#include <limits>

#include "inputs/text_file.hpp"

namespace spokewright {

namespace {

// from_chars over the whole text. It knows no leading '+', which people do write.
template <typename Number>
std::errc parse_whole(std::string_view text, Number& value) {
    if (text.starts_with('+') && !text.starts_with("+-")) text.remove_prefix(1);
    const char* end = text.data() + text.size();
    const auto [stop, error] = std::from_chars(text.data(), end, value);
    return error == std::errc() && stop != end ? std::errc::invalid_argument : error;
}

template <typename Integer>
Integer read_whole(std::string_view text, Integer low, Integer high) {
    const std::string allowed = fmt::format("allowed: a whole number, {}..{}", low, high);
    Integer value{};
    const std::errc error = parse_whole(text, value);
    if (error == std::errc::invalid_argument) {
        throw BadValue(fmt::format("{} is not a whole number; {}", quoted(text), allowed));
    }
    if (error != std::errc() || value < low || value > high) {
        throw BadValue(fmt::format("{} is out of range; {}", escaped(text), allowed));
    }
    return value;
}

}  // namespace

std::string range_text(const Range& range, const Unit& unit) {
    return fmt::format("{}{:g}{}{:g}{}{}", range.open_low ? "above " : "", range.low, range.open_low ? " to " : "..",
                       range.high, *unit.name == '\0' ? "" : " ", unit.name);
}

double read_real(std::string_view text, const Range& range, const Unit& unit) {
    const std::string allowed = "allowed: " + range_text(range, unit);
    double value = 0;
    const std::errc error = parse_whole(text, value);
    if (error == std::errc::invalid_argument) {
        throw BadValue(fmt::format("{} is not a number; {}", quoted(text), allowed));
    }
    const bool outside = value < range.low || value > range.high || (range.open_low && value <= range.low);
    if (error != std::errc() || !std::isfinite(value) || outside) {
        throw BadValue(fmt::format("{} is out of range; {}", escaped(text), allowed));
    }
    return value;
}

std::int64_t read_integer(std::string_view text, std::int64_t low, std::int64_t high) {
    return read_whole(text, low, high);
}

std::uint64_t read_unsigned(std::string_view text) {
    return read_whole<std::uint64_t>(text, 0, std::numeric_limits<std::uint64_t>::max());
}

std::size_t read_choice(std::string_view text, const std::vector<std::string>& choices) {
    const auto found = std::find(choices.begin(), choices.end(), text);
    if (found == choices.end()) {
        throw BadValue(fmt::format("{} is not a choice; allowed: {}", quoted(text), fmt::join(choices, ", ")));
    }
    return static_cast<std::size_t>(found - choices.begin());
}

std::vector<std::string_view> list_items(std::string_view text) {
    constexpr std::string_view kSeparators = " \t,";
    std::vector<std::string_view> items;
    for (std::size_t start = text.find_first_not_of(kSeparators); start != std::string_view::npos;) {
        const std::size_t end = std::min(text.find_first_of(kSeparators, start), text.size());
        items.push_back(text.substr(start, end - start));
        start = text.find_first_not_of(kSeparators, end);
    }
    if (items.empty()) throw BadValue("empty; allowed: values separated by spaces or commas");
    return items;
}

}  // namespace spokewright
