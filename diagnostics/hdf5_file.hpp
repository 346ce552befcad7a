// SPDX-License-Identifier: MIT
// The one door to HDF5. A new file is built in memory and appears on `commit`, whole or not at all; every dataset
// carries its unit and a description, and a checksum, so that a damaged file is noticed when it is read. Names are
// paths ("/series/time_ns"); missing groups are made. T: double, float, int32, uint32, int64, uint64.
#pragma once

#include <cstdint>
#include <memory>
#include <span>
#include <string>
#include <vector>

namespace spokewright {

/// What every dataset must say about itself.
struct Label {
    std::string unit;  // "1" for a plain number, "text" for words
    std::string description;
};

class Hdf5File {
public:
    /// A new file for `path`; throws FileError at once when its folder is missing or may not be written.
    static Hdf5File create(const std::string& path);
    /// An existing file, to read. FileError when it is missing, truncated or not HDF5.
    static Hdf5File open(const std::string& path);
    /// The same for a file that must be as `commit` left it, to the last bit: FileError when it is not. HDF5 trusts the
    /// structure of a file and may crash on a damaged one.
    static Hdf5File open_sealed(const std::string& path);
    ~Hdf5File();
    Hdf5File(Hdf5File&&) noexcept;
    Hdf5File& operator=(Hdf5File&&) noexcept;

    /// Writes the file in place (see write_whole_file) and closes it. Without it nothing is left on the disk.
    void commit();

    /// One dataset, row-major. `shape` empty = one dimension of values.size(); its product must be values.size().
    template <typename T>
    void write(const std::string& name, std::span<const T> values, const Label& label,
               const std::vector<std::size_t>& shape = {});
    template <typename T>
    void write(const std::string& name, const std::vector<T>& values, const Label& label,
               const std::vector<std::size_t>& shape = {}) {
        write(name, std::span<const T>(values), label, shape);
    }
    /// One number (a dataset of length 1).
    template <typename T>
    void write_number(const std::string& name, T value, const Label& label) {
        write(name, std::span<const T>(&value, 1), label);
    }
    void write_text(const std::string& name, const std::string& text, const std::string& description);
    void write_texts(const std::string& name, const std::vector<std::string>& texts, const std::string& description);

    /// The whole dataset, converted to T by HDF5. FileError when it is missing or damaged.
    template <typename T>
    std::vector<T> read(const std::string& name) const;
    template <typename T>
    T read_number(const std::string& name) const;
    std::string read_text(const std::string& name) const;
    std::vector<std::string> read_texts(const std::string& name) const;
    std::vector<std::size_t> shape(const std::string& name) const;
    Label label(const std::string& name) const;
    bool has(const std::string& name) const;
    /// Names in a group, in the order they were written; empty when there is no such group.
    std::vector<std::string> list(const std::string& group) const;

private:
    struct Handle;
    Hdf5File(std::string path, std::unique_ptr<Handle> handle);
    std::string path_;
    std::unique_ptr<Handle> handle_;
};

}  // namespace spokewright
