// SPDX-License-Identifier: MIT
#include <doctest/doctest.h>

#include <cmath>
#include <filesystem>
#include <fstream>
#include <initializer_list>
#include <limits>
#include <numeric>

#include "diagnostics/hdf5_file.hpp"
#include "inputs/errors.hpp"
#include "tests/scratch_folder.hpp"

using namespace spokewright;

namespace {

template <typename T>
void round_trip(const ScratchFolder& folder) {
    const std::vector<T> values{T{0}, T{1}, std::numeric_limits<T>::max(), std::numeric_limits<T>::lowest()};
    {
        Hdf5File file = Hdf5File::create(folder.file("t.h5"));
        file.write("/a/b/values", values, {"m", "some"});
        file.write_number("/a/one", values[2], {"s", "one"});
        file.commit();
    }
    const Hdf5File file = Hdf5File::open(folder.file("t.h5"));
    CHECK(file.read<T>("/a/b/values") == values);
    CHECK(file.read_number<T>("/a/one") == values[2]);
}

std::string message_of(const std::string& path) {
    try {
        const Hdf5File file = Hdf5File::open(path);
        file.read<double>("/x");
    } catch (const FileError& error) {
        return error.what();
    }
    return "";
}

std::string written_file(const ScratchFolder& folder) {
    std::vector<double> values(5000);
    std::iota(values.begin(), values.end(), 0.0);
    Hdf5File file = Hdf5File::create(folder.file("w.h5"));
    file.write("/x", values, {"m", "rising"});
    file.commit();
    return folder.file("w.h5");
}

}  // namespace

TEST_CASE("every type comes back as it went") {
    const ScratchFolder folder;
    round_trip<double>(folder);
    round_trip<float>(folder);
    round_trip<std::int32_t>(folder);
    round_trip<std::uint32_t>(folder);
    round_trip<std::int64_t>(folder);
    round_trip<std::uint64_t>(folder);
}

TEST_CASE("shapes, labels, texts, order and empty sets") {
    const ScratchFolder folder;
    {
        Hdf5File file = Hdf5File::create(folder.file("s.h5"));
        file.write("/g/zebra", std::vector<double>{0, 1, 2, 10, 11, 12}, {"V", "row and column"}, {2, 3});
        file.write("/g/ant", std::vector<float>{}, {"1", "none"});
        file.write("/g/bat", std::vector<double>{NAN}, {"1", "not a number"});
        file.write_text("/t/word", "Ampère\nand more", "a text");
        file.write_text("/t/nothing", "", "an empty text");
        file.write_texts("/t/words", {"b", "", "a"}, "some texts");
        file.write_texts("/t/none", {}, "no texts");
        CHECK_THROWS_AS(file.write("/g/bad", std::vector<double>(5), {"V", "five"}, {2, 3}), std::logic_error);
        file.commit();
    }
    const Hdf5File file = Hdf5File::open(folder.file("s.h5"));
    CHECK(file.shape("/g/zebra") == std::vector<std::size_t>{2, 3});
    CHECK(file.read<double>("/g/zebra")[3] == 10);
    CHECK(file.label("/g/zebra").unit == "V");
    CHECK(file.label("/g/zebra").description == "row and column");
    CHECK(file.read<float>("/g/ant").empty());
    CHECK(std::isnan(file.read_number<double>("/g/bat")));
    CHECK(file.list("/g") == std::vector<std::string>{"zebra", "ant", "bat"});
    CHECK(file.list("/nowhere").empty());
    CHECK(file.read_text("/t/word") == "Ampère\nand more");
    CHECK(file.label("/t/word").unit == "text");
    CHECK(file.read_text("/t/nothing") == "");
    CHECK(file.read_texts("/t/words") == std::vector<std::string>{"b", "", "a"});
    CHECK(file.read_texts("/t/none").empty());
    CHECK(file.has("/g/ant"));
    CHECK_FALSE(file.has("/g/cat"));
    CHECK_FALSE(file.has("/no/where"));
    CHECK_THROWS_WITH_AS(file.read<double>("/g/cat"),
                         (folder.file("s.h5") + ": dataset /g/cat is missing or damaged; make the file again").c_str(),
                         FileError);
}

TEST_CASE("without commit nothing appears, and an old file stands") {
    const ScratchFolder folder;
    const std::string path = folder.write("x.h5", "old");
    {
        Hdf5File file = Hdf5File::create(path);
        file.write("/x", std::vector<double>{1}, {"1", "one"});
    }
    CHECK(std::filesystem::file_size(path) == 3);
    CHECK(std::distance(std::filesystem::directory_iterator(folder.path()), {}) == 1);
}

TEST_CASE("a missing folder is an error before anything is computed for it") {
    const ScratchFolder folder;
    const std::string path = folder.file("no/x.h5");
    CHECK_THROWS_WITH_AS(Hdf5File::create(path),
                         (path + ": cannot write: No such file or directory; choose a folder that "
                                 "exists and that you may write to")
                             .c_str(),
                         FileError);
}

TEST_CASE("missing, foreign and truncated files are told apart from good ones") {
    const ScratchFolder folder;
    CHECK(message_of(folder.file("gone.h5")) == folder.file("gone.h5") + ": cannot read: No such file or directory");
    const std::string words = folder.write("words.h5", std::string(10000, 'w'));
    CHECK(message_of(words) == words + ": truncated or not an HDF5 file; remove it and make it again");
    const std::string path = written_file(folder);
    CHECK(message_of(path) == "");
    for (const double share : {0.9, 0.5, 0.1}) {
        written_file(folder);
        std::filesystem::resize_file(
            path, static_cast<std::uintmax_t>(share * static_cast<double>(std::filesystem::file_size(path))));
        CHECK(message_of(path) == path + ": truncated or not an HDF5 file; remove it and make it again");
    }
}

TEST_CASE("one flipped byte among the numbers is noticed") {
    const ScratchFolder folder;
    const std::string path = written_file(folder);
    std::fstream file(path, std::ios::in | std::ios::out | std::ios::binary);
    const auto middle =
        static_cast<std::streamoff>(std::filesystem::file_size(path)) - 20000;  // 40 kB of numbers end it
    file.seekg(middle);
    const char byte = static_cast<char>(file.get());
    file.seekp(middle);
    file.put(static_cast<char>(byte ^ 0x10));
    file.close();
    CHECK(message_of(path) == path + ": dataset /x is missing or damaged; make the file again");
}
