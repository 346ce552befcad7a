// SPDX-License-Identifier: MIT
// The plain steps are the measure of every ratio in the README. Whoever changes them measures all of them again, and
// then puts the new sums here.
#include <doctest/doctest.h>

#include <string>

#include "inputs/digest.hpp"
#include "inputs/text_file.hpp"

using namespace spokewright;

namespace {

std::string sha256_of(const std::string& file) {
    return sha256_hex(read_text_file(std::string(SPOKEWRIGHT_SOURCE_DIR) + "/tests/oracle/" + file));
}

}  // namespace

TEST_CASE("the plain steps are the ones that were measured") {
    CHECK(sha256_of("reference_step.cpp") == "52a7f9b8afd1a37b286698a401234d0e39e091769918040a49acae564a32ae5b");
    CHECK(sha256_of("tuned_step.cpp") == "745b3a93eaaa0ca14abd7eb35b57b5ee8e9ad16b21c27803c38fececf839511f");
}
