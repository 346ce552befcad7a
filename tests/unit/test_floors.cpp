// SPDX-License-Identifier: MIT
// Nobody climbs: a floor includes only itself and the floors below, and each C library stays in its own room.
#include <doctest/doctest.h>

#include <algorithm>
#include <filesystem>
#include <fstream>
#include <string>
#include <vector>

namespace {

namespace fs = std::filesystem;

const std::vector<std::string> kFloors = {"inputs", "fields", "diagnostics", "pic"};  // from the ground up

struct Room {
    std::string header;                // how the path of the library's headers starts
    std::vector<std::string> allowed;  // folders or files that may include them
};

const std::vector<Room> kRooms = {
    {"fftw3", {"fields/"}},
    {"hdf5", {"diagnostics/"}},
    {"H5", {"diagnostics/"}},
    {"boost/program_options", {"inputs/", "pic/main.cpp", "pic/command_line.cpp"}},
};

// The path of an #include line, or "".
std::string included_path(const std::string& line) {
    const std::size_t hash = line.find_first_not_of(" \t");
    if (hash == std::string::npos || line[hash] != '#' || line.find("include", hash) == std::string::npos) return "";
    const std::size_t start = line.find_first_of("<\"", hash);
    if (start == std::string::npos) return "";
    const std::size_t end = line.find_first_of(">\"", start + 1);
    return end == std::string::npos ? "" : line.substr(start + 1, end - start - 1);
}

std::size_t floor_of(const std::string& path) {
    const auto found = std::ranges::find(kFloors, path.substr(0, path.find('/')));
    return static_cast<std::size_t>(found - kFloors.begin());
}

// What is wrong with `file` including `path`, or "".
std::string fault(const std::string& file, const std::string& path) {
    if (path.find("..") != std::string::npos) return file + " includes a path with ..: " + path;
    if (path.starts_with("tests/")) return file + " includes a test: " + path;
    const std::size_t target = floor_of(path);
    if (target < kFloors.size() && target > floor_of(file)) return file + " climbs to " + path;
    for (const Room& room : kRooms) {
        const auto may_enter = [&](const std::string& allowed) { return file.starts_with(allowed); };
        if (path.starts_with(room.header) && std::ranges::none_of(room.allowed, may_enter)) {
            return file + " takes a library from its room: " + path;
        }
    }
    return "";
}

}  // namespace

TEST_CASE("the check sees a climb and a library out of its room") {
    CHECK(included_path("#include <fftw3.h>") == "fftw3.h");
    CHECK(included_path("  # include \"pic/push.hpp\"  // why") == "pic/push.hpp");
    CHECK(included_path("// nothing to include") == "");
    CHECK(fault("fields/poisson.cpp", "pic/push.hpp") == "fields/poisson.cpp climbs to pic/push.hpp");
    CHECK(fault("pic/push.cpp", "fields/poisson.hpp") == "");
    CHECK(fault("pic/push.cpp", "fftw3.h") == "pic/push.cpp takes a library from its room: fftw3.h");
    CHECK(fault("fields/fourier.cpp", "fftw3.h") == "");
    CHECK(fault("inputs/deck.hpp", "tests/relative_error.hpp") ==
          "inputs/deck.hpp includes a test: tests/relative_error.hpp");
}

TEST_CASE("no source file climbs a floor") {
    const fs::path root = SPOKEWRIGHT_SOURCE_DIR;
    std::size_t count = 0;
    for (const std::string& floor : kFloors) {
        for (const fs::directory_entry& entry : fs::recursive_directory_iterator(root / floor)) {
            const std::string extension = entry.path().extension().string();
            if (extension != ".hpp" && extension != ".cpp") continue;
            const std::string file = entry.path().lexically_relative(root).generic_string();
            std::ifstream stream(entry.path());
            for (std::string line; std::getline(stream, line);) {
                CHECK(fault(file, included_path(line)) == "");
                ++count;
            }
        }
    }
    CHECK(count > 1000);  // it did look into files
}
