// SPDX-License-Identifier: MIT
// A disk that is full, at the start or at the end: exit status 4, the cause and the cure, and no partial file.
#include <doctest/doctest.h>
#include <sys/mount.h>
#include <sys/resource.h>

#include <string>

#include "diagnostics/hdf5_file.hpp"
#include "tests/commands/command.hpp"
#include "tests/commands/quick_tube.hpp"

using namespace spokewright;

namespace {

/// A file system of a few kilobytes in memory.
class SmallDisk {
public:
    SmallDisk(std::string folder, const char* options) : folder_(std::move(folder)) {
        std::filesystem::create_directory(folder_);
        mounted_ = mount("tmpfs", folder_.c_str(), "tmpfs", 0, options) == 0;
    }
    ~SmallDisk() {
        if (mounted_) umount2(folder_.c_str(), MNT_DETACH);
    }
    SmallDisk(const SmallDisk&) = delete;
    SmallDisk& operator=(const SmallDisk&) = delete;

    bool mounted() const {
        if (!mounted_) MESSAGE("skipped: a small file system can be mounted by root only");
        return mounted_;
    }

private:
    std::string folder_;
    bool mounted_;
};

}  // namespace

TEST_CASE("a full disk is noticed before the run starts") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    const SmallDisk disk(folder.file("disk"), "size=64k");
    if (!disk.mounted()) return;
    folder.write("disk/filler", std::string(65536, 'x'));
    const Outcome outcome = spokewright::spokewright(run_of(deck, folder.file("disk"), {"--quiet"}));
    CHECK(outcome.status == 4);
    CHECK(outcome.err == folder.file("disk/.spokewright-trial") +
                             ": cannot write: No space left on device; free some space or choose another folder\n");
    CHECK(names_in(folder.file("disk")) == Arguments{"filler"});
}

TEST_CASE("a disk too small for the result leaves no partial file") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    const SmallDisk disk(folder.file("disk"), "size=64k");
    if (!disk.mounted()) return;
    const Outcome outcome = spokewright::spokewright(run_of(deck, folder.file("disk"), {"--quiet"}));
    CHECK(outcome.status == 4);
    CHECK(outcome.err == folder.file("disk/state.h5") +
                             ": cannot write: No space left on device; free some space or choose another folder\n");
    CHECK(outcome.out == "");
    CHECK(names_in(folder.file("disk")).empty());
}

TEST_CASE("where only the state fits, it is whole") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    const std::string roomy = folder.file("roomy");
    REQUIRE(spokewright::spokewright(run_of(deck, roomy, {"--quiet"})).status == 0);
    const auto pages = [&](const char* name) { return (std::filesystem::file_size(roomy + name) + 4095) / 4096 * 4; };
    const std::string size = "size=" + std::to_string(pages("/state.h5") + pages("/run.h5") / 2) + "k";
    const SmallDisk disk(folder.file("disk"), size.c_str());
    if (!disk.mounted()) return;
    const Outcome outcome = spokewright::spokewright(run_of(deck, folder.file("disk"), {"--quiet"}));
    CHECK(outcome.status == 4);
    CHECK(outcome.err == folder.file("disk/run.h5") +
                             ": cannot write: No space left on device; free some space or choose another folder\n");
    CHECK(names_in(folder.file("disk")) == Arguments{"state.h5"});
    CHECK(Hdf5File::open_sealed(folder.file("disk/state.h5")).has("/electrons/r"));
}

TEST_CASE("a limit on the size of files is an error, not a kill") {
    const ScratchFolder folder;
    const std::string deck = folder.write("tube.ini", kQuickTube);
    rlimit before{};
    getrlimit(RLIMIT_FSIZE, &before);
    const rlimit small{65536, before.rlim_max};  // bytes; the started process inherits it
    setrlimit(RLIMIT_FSIZE, &small);
    const Outcome outcome = spokewright::spokewright(run_of(deck, folder.file("out"), {"--quiet"}));
    setrlimit(RLIMIT_FSIZE, &before);
    CHECK(outcome.status == 4);
    CHECK(outcome.err ==
          folder.file("out/state.h5") + ": cannot write: File too large; free some space or choose another folder\n");
    CHECK(names_in(folder.file("out")).empty());
}
