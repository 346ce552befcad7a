// SPDX-License-Identifier: MIT
#include "inputs/digest.hpp"

#include <fmt/format.h>
#include <openssl/evp.h>

#include <array>
#include <stdexcept>

namespace spokewright {

std::string sha256_hex(std::string_view bytes) {
    std::array<unsigned char, EVP_MAX_MD_SIZE> digest{};
    unsigned length = 0;
    if (EVP_Digest(bytes.data(), bytes.size(), digest.data(), &length, EVP_sha256(), nullptr) != 1) {
        throw std::runtime_error("SHA-256 is not available in this OpenSSL");
    }
    return fmt::format("{:02x}", fmt::join(digest.data(), digest.data() + length, ""));
}

}  // namespace spokewright
