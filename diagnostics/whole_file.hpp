// SPDX-License-Identifier: MIT
// Files that appear whole or not at all.
#pragma once

#include <string>
#include <string_view>

namespace spokewright {

/// Writes `bytes` beside `path` (PATH.partial), syncs, renames it into place and syncs the folder. An old file at
/// `path` is replaced; after a failure it still stands and nothing new is left behind. Throws FileError with path and
/// cause.
void write_whole_file(const std::string& path, std::string_view bytes);

}  // namespace spokewright
