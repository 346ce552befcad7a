// SPDX-License-Identifier: MIT
// What can go wrong, as exceptions whose text is what the user reads. Exit status: see each class.
#pragma once

#include <stdexcept>

namespace spokewright {

/// Bad command line, deck or plan (exit status 2).
struct InputError : std::runtime_error {
    using std::runtime_error::runtime_error;
};

/// The numbers failed: non-finite or under-resolved beyond repair (exit status 3).
struct NumericsError : std::runtime_error {
    using std::runtime_error::runtime_error;
};

/// A file cannot be read or written (exit status 4).
struct FileError : std::runtime_error {
    using std::runtime_error::runtime_error;
};

}  // namespace spokewright
