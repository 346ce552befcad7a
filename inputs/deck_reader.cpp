// SPDX-License-Identifier: MIT
#include "inputs/deck_reader.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <boost/program_options.hpp>
#include <map>
#include <sstream>

#include "inputs/deck_keys.hpp"
#include "inputs/deck_values.hpp"
#include "inputs/digest.hpp"
#include "inputs/errors.hpp"
#include "inputs/text_file.hpp"

namespace spokewright {

namespace {

// What the user gave for a key, and where.
struct Given {
    std::string text;
    std::string place;
};
using GivenKeys = std::map<std::string, Given, std::less<>>;

bool is_section(std::string_view name) {
    return std::ranges::count(deck_keys(), name, &DeckKey::section) > 0;
}

bool is_key(std::string_view full_name) {
    return std::ranges::any_of(deck_keys(), [&](const DeckKey& key) { return key.full_name() == full_name; });
}

[[noreturn]] void throw_unknown_key(std::string_view full_name, const std::string& place) {
    const std::size_t dot = std::min(full_name.find('.'), full_name.size());
    const std::string_view name = dot < full_name.size() ? full_name.substr(dot + 1) : full_name;
    const std::string_view section = dot < full_name.size() ? full_name.substr(0, dot) : std::string_view();
    throw InputError(fmt::format("{}: {}: unknown key; the nearest known key is {}", place, escaped(full_name),
                                 nearest_key(section, name)));
}

// Puts `section.key=value` into `keys`. Boost parses one line at a time because it does not count lines.
void add_line(std::string_view section, std::string_view line, const std::string& place, GivenKeys& keys) {
    namespace options = boost::program_options;
    std::istringstream ini(section.empty() ? std::string(line) : fmt::format("[{}]\n{}", section, line));
    std::vector<options::option> parsed;
    try {
        parsed = options::parse_config_file(ini, options::options_description(), true).options;
    } catch (const options::error&) {
        throw InputError(fmt::format("{}: {}: not a setting; allowed: [section] or key = value", place, quoted(line)));
    }
    for (const options::option& option : parsed) {
        const std::string& name = option.string_key;
        if (!is_key(name)) throw_unknown_key(name, place);
        const auto [entry, is_new] = keys.try_emplace(name, Given{option.value.at(0), place});
        if (!is_new) {
            throw InputError(
                fmt::format("{}: {}: given twice; allowed: once (first at {})", place, name, entry->second.place));
        }
    }
}

std::string section_name(std::string_view header, const std::string& place) {
    const std::string_view name = strip_comment(header.substr(1, header.size() - 2));
    if (is_section(name)) return std::string(name);
    throw InputError(fmt::format("{}: [{}]: unknown section; the nearest known section is [{}]", place, escaped(name),
                                 nearest_section(name)));
}

GivenKeys keys_of_file(const std::string& text, const std::string& path) {
    GivenKeys keys;
    std::string section;
    std::size_t line_number = 0;
    for (const std::string_view raw_line : split_lines(text)) {
        const std::string place = fmt::format("{}:{}", path, ++line_number);
        const std::string_view line = strip_comment(raw_line);
        if (line.empty()) continue;
        if (line.starts_with('[') && line.ends_with(']')) {
            section = section_name(line, place);
        } else if (section.empty()) {
            throw InputError(
                fmt::format("{}: {}: stands before any section; allowed: [section] first", place, quoted(line)));
        } else {
            add_line(section, line, place, keys);
        }
    }
    return keys;
}

GivenKeys keys_of_overrides(const std::vector<std::string>& overrides) {
    GivenKeys keys;
    for (const std::string& text : overrides) {
        const std::string place = "--set " + escaped(text);
        require_plain_text(text, place, false);
        if (text.find_first_of("#\r\n") != std::string::npos || text.find('=') == std::string::npos ||
            strip_comment(text).starts_with('[')) {
            throw InputError(place + ": not a setting; allowed: section.key=value on one line, without #");
        }
        add_line("", text, place, keys);
    }
    return keys;
}

// Fills the deck from one key and returns the text in force, or nothing when the key is not in force.
std::optional<std::string> apply_key(const DeckKey& key, const GivenKeys& keys, Deck& deck) {
    const auto given = keys.find(key.full_name());
    const bool is_given = given != keys.end();
    try {
        if (is_given && !key.rival.empty() && keys.contains(key.section + '.' + key.rival)) {
            throw BadValue(fmt::format("given beside {0}; allowed: {1} or {0}, not both", key.rival, key.name));
        }
        if (!is_given && !key.preset.resolve) throw BadValue("missing; allowed: " + key.value.range);
        const std::optional<std::string> text = is_given ? given->second.text : key.preset.resolve(deck);
        if (text) key.value.read(deck, *text);
        return text;
    } catch (const BadValue& fault) {
        const std::string& place = is_given ? given->second.place : deck.path;
        throw InputError(fmt::format("{}: {}: {}", place, key.full_name(), fault.what()));
    } catch (const FileError& fault) {  // a file that the key names; only given keys name files
        throw FileError(fmt::format("{}: {}: {}; give a file that may be read", given->second.place, key.full_name(),
                                    fault.what()));
    }
}

std::string resolved_text(const std::vector<std::optional<std::string>>& texts) {
    const std::vector<DeckKey>& keys = deck_keys();
    std::string result;
    for (std::size_t i = 0; i < keys.size(); ++i) {
        if (i == 0 || keys[i].section != keys[i - 1].section) {
            result += fmt::format("{}[{}]\n", i == 0 ? "" : "\n", keys[i].section);
        }
        const bool yields = i + 1 < keys.size() && keys[i + 1].rival == keys[i].name && texts[i + 1].has_value();
        const bool in_force = texts[i].has_value() && !yields;
        result += in_force ? fmt::format("{} = {}\n", keys[i].name, *texts[i])
                           : fmt::format("# {}: not in force\n", keys[i].name);
    }
    return result;
}

}  // namespace

Deck read_deck(const std::string& path, const std::vector<std::string>& overrides) {
    Deck deck;
    deck.path = path;
    deck.text = read_text_file(path);
    deck.overrides = overrides;
    const GivenKeys from_file = keys_of_file(deck.text, path);
    GivenKeys keys = keys_of_overrides(overrides);
    keys.insert(from_file.begin(), from_file.end());  // keeps what is there: an override wins

    std::vector<std::optional<std::string>> texts;
    for (const DeckKey& key : deck_keys()) texts.push_back(apply_key(key, keys, deck));
    std::ranges::sort(deck.circuit.modes, {}, &ModeEntry::number);

    deck.resolved_text = resolved_text(texts);
    std::string hashed = deck.text;
    for (const std::string& text : overrides) hashed += "\n--set " + text;
    deck.sha256 = sha256_hex(hashed);
    return deck;
}

}  // namespace spokewright
