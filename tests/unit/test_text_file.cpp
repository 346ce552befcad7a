// SPDX-License-Identifier: MIT
// What counts as text, and how bytes are quoted.
#include "inputs/text_file.hpp"

#include <doctest/doctest.h>

#include <string>

#include "tests/unit/small_deck.hpp"

using namespace spokewright;

TEST_CASE("files that are no text") {
    CHECK(message_of(std::string("[tube]\nvane\0", 12)) ==
          "tube.ini:2: not plain text: byte 0x00; allowed: UTF-8 text");
    CHECK(message_of("\x80") == "tube.ini:1: not plain text: byte 0x80; allowed: UTF-8 text");
    CHECK(message_of("\xED\xA0\x80") == "tube.ini:1: not plain text: byte 0xed; allowed: UTF-8 text");
    CHECK(message_of("a\rb") == "tube.ini:1: not plain text: byte 0x0d; allowed: UTF-8 text");
    CHECK(message_of(std::string(1'000'001, '#')) ==
          "tube.ini: too large; allowed: a text file of at most 1000000 bytes");
    CHECK(message_of("[tube]\n" + std::string(900'000, 'k') + " = 1\n").size() < 200);
    CHECK(message_of("[tube]\nname = " + std::string(900'000, 'k') + "\n") ==
          "tube.ini:2: tube.name: the name has the wrong length; allowed: 1..80 bytes");
}

TEST_CASE("UTF-8 as RFC 3629 bounds it") {
    for (const char* good : {"\xC2\x80", "\xE0\xA0\x80", "\xED\x9F\xBF", "\xF0\x90\x80\x80", "\xF4\x8F\xBF\xBF"}) {
        CHECK_NOTHROW(require_plain_text(good, "here", false));
    }
    for (const char* bad :
         {"\xC1\x80", "\xE0\x9F\x80", "\xED\xA0\x80", "\xF0\x8F\x80\x80", "\xF4\x90\x80\x80", "\xC2"}) {
        CHECK_THROWS_AS(require_plain_text(bad, "here", false), InputError);
    }
}

TEST_CASE("quoted text is printable ASCII of a bounded length") {
    CHECK(quoted("a\"b\\\x01\xff") == "\"a\\x22b\\x5c\\x01\\xff\"");
    CHECK(escaped(std::string(100, 'a'), 3) == "aaa...");
}

TEST_CASE("lines end with LF or CRLF") {
    CHECK(split_lines("a\r\n\nb") == std::vector<std::string_view>{"a", "", "b"});
    CHECK(split_lines("").empty());
    CHECK(strip_comment(" \ta b # c") == "a b");
    CHECK(strip_comment("# c").empty());
}
