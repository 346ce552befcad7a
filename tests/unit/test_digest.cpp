// SPDX-License-Identifier: MIT
#include "inputs/digest.hpp"

#include <doctest/doctest.h>

using namespace spokewright;

TEST_CASE("SHA-256 of the standard's own examples") {
    // FIPS 180-2, appendix B.1, and the empty message.
    CHECK(sha256_hex("abc") == "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
    CHECK(sha256_hex("") == "e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855");
}
