// SPDX-License-Identifier: MIT
// A small text file as the user wrote it, checked to be text, and the means to quote it in a message.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

namespace spokewright {

inline constexpr std::size_t kLargestTextFile = 1'000'000;  // bytes; a deck is a few kilobytes

/// The bytes of a text file. Throws FileError when it cannot be read, InputError when it is larger than
/// kLargestTextFile or is not UTF-8 text (`FILE:LINE: ...`).
std::string read_text_file(const std::string& path);

/// Throws InputError `PLACE[:LINE]: not plain text: ...` on a control byte or on bytes that are not UTF-8.
/// With `number_lines` the line is part of the place.
void require_plain_text(std::string_view text, const std::string& place, bool number_lines);

/// The lines of a text without their LF or CRLF ends; a leading byte order mark is dropped. Views into `text`.
std::vector<std::string_view> split_lines(std::string_view text);

/// Text without a `#` comment and without blanks at either end.
std::string_view strip_comment(std::string_view line);

/// Printable ASCII: every other byte, the quote and the backslash as \xNN, cut after `limit` bytes with "...".
std::string escaped(std::string_view text, std::size_t limit = 60);

/// Escaped text between double quotes.
std::string quoted(std::string_view text);

}  // namespace spokewright
