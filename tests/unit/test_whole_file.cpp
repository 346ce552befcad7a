// SPDX-License-Identifier: MIT
#include <doctest/doctest.h>
#include <sys/resource.h>

#include <csignal>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <string>

#include "diagnostics/whole_file.hpp"
#include "inputs/errors.hpp"
#include "tests/scratch_folder.hpp"

using namespace spokewright;

namespace {

std::string bytes_of(const std::string& path) {
    std::ifstream file(path, std::ios::binary);
    return {std::istreambuf_iterator<char>(file), std::istreambuf_iterator<char>()};
}

std::size_t entries(const std::filesystem::path& folder) {
    return static_cast<std::size_t>(std::distance(std::filesystem::directory_iterator(folder), {}));
}

/// No file of this process may grow beyond a few bytes: what a full disk looks like to a writer.
class NoRoom {
public:
    explicit NoRoom(rlim_t bytes) {
        ::getrlimit(RLIMIT_FSIZE, &before_);
        handler_ = std::signal(SIGXFSZ, SIG_IGN);  // an error instead of a signal
        const rlimit narrow{bytes, before_.rlim_max};
        ::setrlimit(RLIMIT_FSIZE, &narrow);
    }
    ~NoRoom() {
        ::setrlimit(RLIMIT_FSIZE, &before_);
        std::signal(SIGXFSZ, handler_);
    }
    NoRoom(const NoRoom&) = delete;
    NoRoom& operator=(const NoRoom&) = delete;

private:
    rlimit before_{};
    void (*handler_)(int);
};

}  // namespace

TEST_CASE("the bytes arrive as they are, and nothing else") {
    const ScratchFolder folder;
    const std::string bytes("a\0b\nc", 5);
    write_whole_file(folder.file("x"), bytes);
    CHECK(bytes_of(folder.file("x")) == bytes);
    write_whole_file(folder.file("x"), std::string_view());
    CHECK(bytes_of(folder.file("x")).empty());
    CHECK(entries(folder.path()) == 1);
}

TEST_CASE("without room the old file stands and nothing is left beside it") {
    const ScratchFolder folder;
    write_whole_file(folder.file("x"), "old");
    const std::string big(100000, 'n');
    std::string message;
    {
        const NoRoom no_room(1000);
        try {
            write_whole_file(folder.file("x"), big);
        } catch (const FileError& error) {
            message = error.what();
        }
    }
    CHECK(message == folder.file("x") + ": cannot write: File too large; free some space or choose another folder");
    CHECK(bytes_of(folder.file("x")) == "old");
    CHECK(entries(folder.path()) == 1);
}

TEST_CASE("a missing folder and a folder in the way are named with a cure") {
    const ScratchFolder folder;
    const std::string lost = folder.file("no/x");
    CHECK_THROWS_WITH_AS(write_whole_file(lost, "a"),
                         (lost + ": cannot write: No such file or directory; make the folder first").c_str(),
                         FileError);
    std::filesystem::create_directory(folder.file("y"));
    CHECK_THROWS_AS(write_whole_file(folder.file("y"), "a"), FileError);
    CHECK(entries(folder.path()) == 1);
}
