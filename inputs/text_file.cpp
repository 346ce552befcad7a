// SPDX-License-Identifier: MIT
#include "inputs/text_file.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cerrno>
#include <cstdio>
#include <memory>
#include <system_error>

#include "inputs/errors.hpp"

namespace spokewright {

namespace {

constexpr std::string_view kByteOrderMark = "\xEF\xBB\xBF";

[[noreturn]] void throw_unreadable(const std::string& path, int error_number) {
    throw FileError(fmt::format("{}: cannot be read: {}", path, std::generic_category().message(error_number)));
}

// Length of the UTF-8 sequence at the front of `text`, or 0 when there is none (RFC 3629, section 4).
std::size_t utf8_length(std::string_view text) {
    const auto byte = [&](std::size_t i) { return static_cast<unsigned char>(text[i]); };
    const unsigned lead = byte(0);
    if (lead < 0x80) return 1;
    const std::size_t length = lead >= 0xC2 && lead < 0xE0   ? 2
                               : lead >= 0xE0 && lead < 0xF0 ? 3
                               : lead >= 0xF0 && lead < 0xF5 ? 4
                                                             : 0;
    if (length == 0 || text.size() < length) return 0;
    for (std::size_t i = 1; i < length; ++i) {
        if ((byte(i) & 0xC0U) != 0x80U) return 0;
    }
    const bool overlong = (lead == 0xE0 && byte(1) < 0xA0) || (lead == 0xF0 && byte(1) < 0x90);
    const bool beyond = (lead == 0xED && byte(1) > 0x9F) || (lead == 0xF4 && byte(1) > 0x8F);
    return overlong || beyond ? 0 : length;
}

bool is_text_control(std::string_view rest) {
    return rest[0] == '\t' || rest[0] == '\n' || (rest[0] == '\r' && (rest.size() == 1 || rest[1] == '\n'));
}

}  // namespace

std::string read_text_file(const std::string& path) {
    const std::unique_ptr<std::FILE, int (*)(std::FILE*)> file(std::fopen(path.c_str(), "rb"), &std::fclose);
    if (!file) throw_unreadable(path, errno);
    std::string text;
    std::array<char, 16384> block{};
    while (text.size() <= kLargestTextFile) {
        const std::size_t count = std::fread(block.data(), 1, block.size(), file.get());
        if (std::ferror(file.get()) != 0) throw_unreadable(path, errno);
        if (count == 0) break;
        text.append(block.data(), count);
    }
    if (text.size() > kLargestTextFile) {
        throw InputError(
            fmt::format("{}: too large; allowed: a text file of at most {} bytes", path, kLargestTextFile));
    }
    require_plain_text(text, path, true);
    return text;
}

void require_plain_text(std::string_view text, const std::string& place, bool number_lines) {
    std::size_t line = 1;
    for (std::size_t i = 0; i < text.size();) {
        const std::string_view rest = text.substr(i);
        const auto byte = static_cast<unsigned char>(text[i]);
        const bool control = byte < 0x20 || byte == 0x7F;
        const std::size_t length = utf8_length(rest);
        if (length == 0 || (control && !is_text_control(rest))) {
            const std::string where = number_lines ? fmt::format("{}:{}", place, line) : place;
            throw InputError(fmt::format("{}: not plain text: byte 0x{:02x}; allowed: UTF-8 text", where, byte));
        }
        if (byte == '\n') ++line;
        i += length;
    }
}

std::vector<std::string_view> split_lines(std::string_view text) {
    if (text.starts_with(kByteOrderMark)) text.remove_prefix(kByteOrderMark.size());
    std::vector<std::string_view> lines;
    while (!text.empty()) {
        const std::size_t end = std::min(text.find('\n'), text.size());
        std::string_view line = text.substr(0, end);
        if (line.ends_with('\r')) line.remove_suffix(1);
        lines.push_back(line);
        text.remove_prefix(std::min(end + 1, text.size()));
    }
    return lines;
}

std::string_view strip_comment(std::string_view line) {
    line = line.substr(0, line.find('#'));
    const std::size_t first = line.find_first_not_of(" \t\r\n");
    if (first == std::string_view::npos) return {};
    return line.substr(first, line.find_last_not_of(" \t\r\n") - first + 1);
}

std::string escaped(std::string_view text, std::size_t limit) {
    std::string result;
    for (const char c : text.substr(0, limit)) {
        const auto byte = static_cast<unsigned char>(c);
        const bool plain = byte >= 0x20 && byte < 0x7F && c != '"' && c != '\\';
        result += plain ? std::string(1, c) : fmt::format("\\x{:02x}", byte);
    }
    return text.size() > limit ? result + "..." : result;
}

std::string quoted(std::string_view text) {
    return '"' + escaped(text) + '"';
}

}  // namespace spokewright
