// SPDX-License-Identifier: MIT
#include "diagnostics/whole_file.hpp"

#include <fcntl.h>
#include <fmt/format.h>
#include <unistd.h>

#include <cerrno>
#include <cstdio>
#include <cstring>
#include <filesystem>

#include "inputs/errors.hpp"

namespace spokewright {
namespace {

const char* cure(int error) {
    switch (error) {
        case ENOSPC:
        case EDQUOT:
        case EFBIG:
            return "free some space or choose another folder";
        case EACCES:
        case EPERM:
        case EROFS:
            return "choose a folder that you may write to";
        case ENOENT:
        case ENOTDIR:
            return "make the folder first";
        default:
            return "check the disk";
    }
}

/// The file beside the final one: closed and removed unless it was renamed.
class PartialFile {
public:
    explicit PartialFile(const std::string& path) : path_(path), partial_(path + ".partial") {
        descriptor_ = ::open(partial_.c_str(), O_WRONLY | O_CREAT | O_TRUNC | O_CLOEXEC, 0644);
        if (descriptor_ < 0) fail();
    }
    ~PartialFile() {
        if (descriptor_ >= 0) ::close(descriptor_);
        if (!renamed_) ::unlink(partial_.c_str());
    }
    PartialFile(const PartialFile&) = delete;
    PartialFile& operator=(const PartialFile&) = delete;

    void write(std::string_view bytes) {
        while (!bytes.empty()) {
            const ssize_t written = ::write(descriptor_, bytes.data(), bytes.size());
            if (written < 0 && errno == EINTR) continue;  // a stop signal must not cost the file
            if (written < 0) fail();
            bytes.remove_prefix(static_cast<std::size_t>(written));
        }
    }

    void put_in_place() {
        if (::fsync(descriptor_) != 0) fail();
        const int descriptor = descriptor_;
        descriptor_ = -1;
        if (::close(descriptor) != 0) fail();
        if (std::rename(partial_.c_str(), path_.c_str()) != 0) fail();
        renamed_ = true;
    }

private:
    // Called in the constructor too: there nobody else removes the file, but then there is none.
    [[noreturn]] void fail() const {
        const int error = errno;
        throw FileError(fmt::format("{}: cannot write: {}; {}", path_, std::strerror(error), cure(error)));
    }

    std::string path_;
    std::string partial_;
    int descriptor_ = -1;
    bool renamed_ = false;
};

/// Makes the rename itself last. A file system that cannot sync folders has done all it can.
void sync_folder(const std::string& path) {
    const std::filesystem::path parent = std::filesystem::path(path).parent_path();
    const int descriptor = ::open(parent.empty() ? "." : parent.c_str(), O_RDONLY | O_DIRECTORY | O_CLOEXEC);
    if (descriptor < 0) return;
    ::fsync(descriptor);
    ::close(descriptor);
}

}  // namespace

void write_whole_file(const std::string& path, std::string_view bytes) {
    PartialFile file(path);
    file.write(bytes);
    file.put_in_place();
    sync_folder(path);
}

}  // namespace spokewright
