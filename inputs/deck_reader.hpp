// SPDX-License-Identifier: MIT
// Reads a deck: INI text by Boost.Program_options, keys by the table in deck_keys.hpp.
#pragma once

#include <string>
#include <vector>

#include "inputs/deck.hpp"

namespace spokewright {

/// Reads the deck at `path`, then each override "section.key=value", which wins over the file. The result is complete:
/// every default is resolved, in SI units. Throws FileError when the deck or its field table cannot be read, and
/// InputError `FILE:LINE: key: what is wrong; what is allowed` (`--set section.key=value` as the place of an override).
Deck read_deck(const std::string& path, const std::vector<std::string>& overrides);

}  // namespace spokewright
