// SPDX-License-Identifier: MIT
// state.h5: all that a run needs to go on to the last bit as if it had never stopped.
#pragma once

#include <string>
#include <vector>

#include "diagnostics/archive_blocks.hpp"
#include "diagnostics/record.hpp"
#include "pic/interaction_space.hpp"

namespace spokewright {

struct Checkpoint {
    SpaceState space;
    std::vector<Column> columns;       // the record's
    std::vector<double> record_state;  // see Record::state
    std::vector<Snapshot> snapshots;
    double wall_clock = 0;  // s, of all legs so far
};

/// Appears whole or not at all. FileError when it cannot be written.
void write_checkpoint(const std::string& path, const Deck& deck, const Checkpoint& checkpoint, double macro_weight);

/// FileError when the file is missing or damaged; InputError when it belongs to another deck. Only the end time and the
/// [output] section may have changed.
Checkpoint read_checkpoint(const std::string& path, const Deck& deck);

}  // namespace spokewright
