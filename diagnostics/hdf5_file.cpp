// SPDX-License-Identifier: MIT
#include "diagnostics/hdf5_file.hpp"

#include <fmt/format.h>
#include <hdf5.h>
#include <unistd.h>

#include <array>
#include <cerrno>
#include <cstring>
#include <filesystem>
#include <fstream>
#include <functional>
#include <iterator>
#include <numeric>
#include <utility>

#include "diagnostics/whole_file.hpp"
#include "inputs/digest.hpp"
#include "inputs/errors.hpp"

namespace spokewright {
namespace {

/// Owns one HDF5 identifier.
class Id {
public:
    Id(hid_t id, herr_t (*close)(hid_t)) : id_(id), close_(close) {}
    ~Id() { reset(); }
    Id(Id&& other) noexcept : id_(std::exchange(other.id_, -1)), close_(other.close_) {}
    Id& operator=(Id&& other) noexcept {
        std::swap(id_, other.id_);
        std::swap(close_, other.close_);
        return *this;
    }
    operator hid_t() const { return id_; }
    bool valid() const { return id_ >= 0; }
    void reset() {
        if (valid()) close_(std::exchange(id_, -1));
    }

private:
    hid_t id_;
    herr_t (*close_)(hid_t);
};

hid_t native_type(double) {
    return H5T_NATIVE_DOUBLE;
}
hid_t native_type(float) {
    return H5T_NATIVE_FLOAT;
}
hid_t native_type(std::int32_t) {
    return H5T_NATIVE_INT32;
}
hid_t native_type(std::uint32_t) {
    return H5T_NATIVE_UINT32;
}
hid_t native_type(std::int64_t) {
    return H5T_NATIVE_INT64;
}
hid_t native_type(std::uint64_t) {
    return H5T_NATIVE_UINT64;
}

Id string_type() {
    Id type(H5Tcopy(H5T_C_S1), H5Tclose);
    H5Tset_size(type, H5T_VARIABLE);
    H5Tset_cset(type, H5T_CSET_UTF8);
    return type;
}

[[noreturn]] void fail_write(const std::string& path, const std::string& name) {
    throw FileError(fmt::format("{}: cannot build dataset {}: HDF5 refused it; check the memory left", path, name));
}

[[noreturn]] void fail_read(const std::string& path, const std::string& name) {
    throw FileError(fmt::format("{}: dataset {} is missing or damaged; make the file again", path, name));
}

void require_readable(const std::string& path) {
    std::error_code ignored;
    if (std::filesystem::is_directory(path, ignored)) {
        throw FileError(fmt::format("{}: cannot read: it is a folder; give a file", path));
    }
    if (::access(path.c_str(), R_OK) != 0) {
        throw FileError(fmt::format("{}: cannot read: {}", path, std::strerror(errno)));
    }
}

/// The last line of our files, behind what HDF5 reads.
std::string seal(std::string_view bytes) {
    return fmt::format("\nsha256 {}\n", sha256_hex(bytes));
}

/// Chunked, so that it can carry a checksum; at most some 128 k elements a chunk.
Id checked_layout(std::vector<hsize_t> chunk) {
    Id layout(H5Pcreate(H5P_DATASET_CREATE), H5Pclose);
    hsize_t row = 1;
    for (std::size_t d = 1; d < chunk.size(); ++d) row *= chunk[d];
    constexpr hsize_t kChunk = 1 << 17;
    if (row == 0 || chunk[0] == 0) return layout;  // nothing to check
    chunk[0] = std::min(chunk[0], std::max<hsize_t>(1, kChunk / row));
    H5Pset_chunk(layout, static_cast<int>(chunk.size()), chunk.data());
    H5Pset_fletcher32(layout);
    return layout;
}

bool write_attribute(hid_t object, const char* name, const std::string& text) {
    const Id type = string_type();
    const Id space(H5Screate(H5S_SCALAR), H5Sclose);
    const Id attribute(H5Acreate2(object, name, type, space, H5P_DEFAULT, H5P_DEFAULT), H5Aclose);
    const char* words = text.c_str();
    return attribute.valid() && H5Awrite(attribute, type, &words) >= 0;
}

std::string read_attribute(hid_t object, const char* name) {
    const Id attribute(H5Aopen(object, name, H5P_DEFAULT), H5Aclose);
    const Id type = string_type();
    char* words = nullptr;
    if (!attribute.valid() || H5Aread(attribute, type, &words) < 0 || words == nullptr) return "";
    std::string text = words;
    H5free_memory(words);
    return text;
}

}  // namespace

struct Hdf5File::Handle {
    Id file;

    /// Makes the groups above `name`, each keeping the order of its members.
    void make_groups(const std::string& name) const {
        const Id ordered(H5Pcreate(H5P_GROUP_CREATE), H5Pclose);
        H5Pset_link_creation_order(ordered, H5P_CRT_ORDER_TRACKED | H5P_CRT_ORDER_INDEXED);
        for (std::size_t slash = name.find('/', 1); slash != std::string::npos; slash = name.find('/', slash + 1)) {
            const std::string group = name.substr(0, slash);
            if (H5Lexists(file, group.c_str(), H5P_DEFAULT) > 0) continue;
            const Id made(H5Gcreate2(file, group.c_str(), H5P_DEFAULT, ordered, H5P_DEFAULT), H5Gclose);
        }
    }

    bool write(const std::string& name, hid_t type, const Id& space, const Id& layout, const void* values,
               const Label& label) const {
        make_groups(name);
        const Id data(H5Dcreate2(file, name.c_str(), type, space, H5P_DEFAULT, layout, H5P_DEFAULT), H5Dclose);
        return data.valid() && H5Dwrite(data, type, H5S_ALL, H5S_ALL, H5P_DEFAULT, values) >= 0 &&
               write_attribute(data, "unit", label.unit) && write_attribute(data, "description", label.description);
    }

    Id open(const std::string& name) const { return Id(H5Dopen2(file, name.c_str(), H5P_DEFAULT), H5Dclose); }

    std::vector<hsize_t> shape(const Id& data) const {
        const Id space(H5Dget_space(data), H5Sclose);
        std::vector<hsize_t> shape(static_cast<std::size_t>(std::max(0, H5Sget_simple_extent_ndims(space))));
        H5Sget_simple_extent_dims(space, shape.data(), nullptr);
        return shape;
    }
};

Hdf5File::Hdf5File(std::string path, std::unique_ptr<Handle> handle)
    : path_(std::move(path)), handle_(std::move(handle)) {}
Hdf5File::~Hdf5File() = default;
Hdf5File::Hdf5File(Hdf5File&&) noexcept = default;
Hdf5File& Hdf5File::operator=(Hdf5File&&) noexcept = default;

Hdf5File Hdf5File::create(const std::string& path) {
    H5Eset_auto2(H5E_DEFAULT, nullptr, nullptr);  // our exceptions speak, not HDF5
    const std::filesystem::path parent = std::filesystem::path(path).parent_path();
    if (::access(parent.empty() ? "." : parent.c_str(), W_OK | X_OK) != 0) {
        throw FileError(fmt::format("{}: cannot write: {}; choose a folder that exists and that you may write to", path,
                                    std::strerror(errno)));
    }
    const Id access(H5Pcreate(H5P_FILE_ACCESS), H5Pclose);
    H5Pset_fapl_core(access, std::size_t{1} << 22, false);  // grows by 4 MB, never touches the disk itself
    const Id creation(H5Pcreate(H5P_FILE_CREATE), H5Pclose);
    H5Pset_link_creation_order(creation, H5P_CRT_ORDER_TRACKED | H5P_CRT_ORDER_INDEXED);
    Id file(H5Fcreate(path.c_str(), H5F_ACC_TRUNC, creation, access), H5Fclose);
    if (!file.valid()) throw FileError(fmt::format("{}: cannot build an HDF5 file in memory", path));
    return Hdf5File(path, std::make_unique<Handle>(Handle{std::move(file)}));
}

Hdf5File Hdf5File::open(const std::string& path) {
    H5Eset_auto2(H5E_DEFAULT, nullptr, nullptr);
    require_readable(path);
    const Id access(H5Pcreate(H5P_FILE_ACCESS), H5Pclose);
    H5Pset_file_locking(access, false, true);  // our files never change in place; locks fail on some network disks
    Id file(H5Fopen(path.c_str(), H5F_ACC_RDONLY, access), H5Fclose);
    if (!file.valid()) {
        throw FileError(fmt::format("{}: truncated or not an HDF5 file; remove it and make it again", path));
    }
    return Hdf5File(path, std::make_unique<Handle>(Handle{std::move(file)}));
}

Hdf5File Hdf5File::open_sealed(const std::string& path) {
    require_readable(path);
    std::ifstream file(path, std::ios::binary);
    const std::string bytes{std::istreambuf_iterator<char>(file), {}};
    const std::size_t length = bytes.size() - std::min(bytes.size(), seal("").size());
    if (bytes.substr(length) != seal({bytes.data(), length})) {
        throw FileError(fmt::format("{}: truncated or damaged: its checksum does not fit; make the file again", path));
    }
    return open(path);
}

void Hdf5File::commit() {
    std::string image;
    if (H5Fflush(handle_->file, H5F_SCOPE_LOCAL) >= 0) {
        const ssize_t size = H5Fget_file_image(handle_->file, nullptr, 0);
        image.resize(size > 0 ? static_cast<std::size_t>(size) : 0);
    }
    if (image.empty() || H5Fget_file_image(handle_->file, image.data(), image.size()) < 0) {
        throw FileError(fmt::format("{}: cannot finish the HDF5 file in memory; check the memory left", path_));
    }
    handle_->file.reset();
    image += seal(image);
    write_whole_file(path_, image);
}

template <typename T>
void Hdf5File::write(const std::string& name, std::span<const T> values, const Label& label,
                     const std::vector<std::size_t>& shape) {
    std::vector<hsize_t> extent(shape.begin(), shape.end());
    if (extent.empty()) extent.push_back(values.size());
    if (std::accumulate(extent.begin(), extent.end(), hsize_t{1}, std::multiplies<>()) != values.size()) {
        throw std::logic_error(fmt::format("dataset {}: shape does not hold its {} values", name, values.size()));
    }
    const Id space(H5Screate_simple(static_cast<int>(extent.size()), extent.data(), nullptr), H5Sclose);
    if (!handle_->write(name, native_type(T{}), space, checked_layout(extent), values.data(), label)) {
        fail_write(path_, name);
    }
}

void Hdf5File::write_text(const std::string& name, const std::string& text, const std::string& description) {
    const Id space(H5Screate(H5S_SCALAR), H5Sclose);
    const Id layout(H5Pcreate(H5P_DATASET_CREATE), H5Pclose);
    const char* words = text.c_str();
    if (!handle_->write(name, string_type(), space, layout, &words, {"text", description})) fail_write(path_, name);
}

void Hdf5File::write_texts(const std::string& name, const std::vector<std::string>& texts,
                           const std::string& description) {
    std::vector<const char*> words;
    for (const std::string& text : texts) words.push_back(text.c_str());
    const hsize_t count = words.size();
    const Id space(H5Screate_simple(1, &count, nullptr), H5Sclose);
    const Id layout(H5Pcreate(H5P_DATASET_CREATE), H5Pclose);
    if (!handle_->write(name, string_type(), space, layout, words.data(), {"text", description})) {
        fail_write(path_, name);
    }
}

template <typename T>
std::vector<T> Hdf5File::read(const std::string& name) const {
    const Id data = handle_->open(name);
    if (!data.valid()) fail_read(path_, name);
    const auto extent = handle_->shape(data);
    std::vector<T> values(std::accumulate(extent.begin(), extent.end(), std::size_t{1}, std::multiplies<>()));
    if (H5Dread(data, native_type(T{}), H5S_ALL, H5S_ALL, H5P_DEFAULT, values.data()) < 0) fail_read(path_, name);
    return values;
}

template <typename T>
T Hdf5File::read_number(const std::string& name) const {
    const std::vector<T> values = read<T>(name);
    if (values.size() != 1) fail_read(path_, name);
    return values.front();
}

std::vector<std::string> Hdf5File::read_texts(const std::string& name) const {
    const Id data = handle_->open(name);
    if (!data.valid()) fail_read(path_, name);
    const auto extent = handle_->shape(data);
    std::vector<char*> words(std::accumulate(extent.begin(), extent.end(), std::size_t{1}, std::multiplies<>()));
    const Id type = string_type();
    if (H5Dread(data, type, H5S_ALL, H5S_ALL, H5P_DEFAULT, words.data()) < 0) fail_read(path_, name);
    std::vector<std::string> texts;
    for (char* word : words) {
        texts.emplace_back(word != nullptr ? word : "");
        H5free_memory(word);
    }
    return texts;
}

std::string Hdf5File::read_text(const std::string& name) const {
    const auto texts = read_texts(name);
    if (texts.size() != 1) fail_read(path_, name);
    return texts.front();
}

std::vector<std::size_t> Hdf5File::shape(const std::string& name) const {
    const Id data = handle_->open(name);
    if (!data.valid()) fail_read(path_, name);
    const auto extent = handle_->shape(data);
    return {extent.begin(), extent.end()};
}

Label Hdf5File::label(const std::string& name) const {
    const Id data = handle_->open(name);
    if (!data.valid()) fail_read(path_, name);
    return {read_attribute(data, "unit"), read_attribute(data, "description")};
}

bool Hdf5File::has(const std::string& name) const {
    for (std::size_t slash = name.find('/', 1); slash != std::string::npos; slash = name.find('/', slash + 1)) {
        if (H5Lexists(handle_->file, name.substr(0, slash).c_str(), H5P_DEFAULT) <= 0) return false;
    }
    return H5Lexists(handle_->file, name.c_str(), H5P_DEFAULT) > 0;
}

std::vector<std::string> Hdf5File::list(const std::string& group) const {
    std::vector<std::string> names;
    const Id opened(H5Gopen2(handle_->file, group.c_str(), H5P_DEFAULT), H5Gclose);
    if (!opened.valid()) return names;
    const auto append = [](hid_t, const char* name, const H5L_info_t*, void* list) -> herr_t {
        static_cast<std::vector<std::string>*>(list)->emplace_back(name);
        return 0;
    };
    if (H5Literate(opened, H5_INDEX_CRT_ORDER, H5_ITER_INC, nullptr, append, &names) < 0) {
        names.clear();  // a file of another maker may not keep the order
        H5Literate(opened, H5_INDEX_NAME, H5_ITER_INC, nullptr, append, &names);
    }
    return names;
}

#define SPOKEWRIGHT_HDF5_TYPE(T)                                                           \
    template void Hdf5File::write<T>(const std::string&, std::span<const T>, const Label&, \
                                     const std::vector<std::size_t>&);                     \
    template std::vector<T> Hdf5File::read<T>(const std::string&) const;                   \
    template T Hdf5File::read_number<T>(const std::string&) const;
SPOKEWRIGHT_HDF5_TYPE(double)
SPOKEWRIGHT_HDF5_TYPE(float)
SPOKEWRIGHT_HDF5_TYPE(std::int32_t)
SPOKEWRIGHT_HDF5_TYPE(std::uint32_t)
SPOKEWRIGHT_HDF5_TYPE(std::int64_t)
SPOKEWRIGHT_HDF5_TYPE(std::uint64_t)

}  // namespace spokewright
