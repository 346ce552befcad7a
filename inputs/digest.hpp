// SPDX-License-Identifier: MIT
// SHA-256 (FIPS 180-4), by OpenSSL: names a deck, seals a file.
#pragma once

#include <string>
#include <string_view>

namespace spokewright {

/// 64 lower-case hexadecimal digits.
std::string sha256_hex(std::string_view bytes);

}  // namespace spokewright
