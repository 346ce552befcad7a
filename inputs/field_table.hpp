// SPDX-License-Identifier: MIT
// The axial magnetic field B_z(r) of a magnet from a table: two columns, r_mm and B_T, `#` starts a comment.
#pragma once

#include <string>
#include <vector>

#include "inputs/deck.hpp"

namespace spokewright {

/// Reads a table with rising radii that covers cathode_radius..anode_radius (m). Returns SI samples.
/// Throws FileError when the file cannot be read, InputError `FILE:LINE: ...` when it is malformed.
std::vector<FieldSample> read_field_table(const std::string& path, double cathode_radius, double anode_radius);

}  // namespace spokewright
