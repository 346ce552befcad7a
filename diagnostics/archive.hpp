// SPDX-License-Identifier: MIT
// run.h5: everything a run has learnt, for notebooks and reports.
//   /series/<column>      the record, one row a sample
//   /spectra/...          of each mode's voltage and of the charge by angle, over the averaged part
//   /axes/r_m, theta_rad  of the snapshots' nodes
//   /snapshots/<k>/...    k = 0, 1, ... by time
//   /walls/anode, cathode what struck them since the start, by sector and by impact energy
//   /ledger/...           energies since the start
//   /deck, /provenance    what made this file
#pragma once

#include <cstdint>
#include <string>
#include <vector>

#include "diagnostics/archive_blocks.hpp"
#include "diagnostics/record.hpp"
#include "diagnostics/summary.hpp"
#include "diagnostics/wall_books.hpp"
#include "inputs/deck.hpp"

namespace spokewright {

struct Provenance {
    std::string version;
    std::int64_t threads = 1;
    std::string build_flags;
    std::string finished_utc;  // ISO 8601
};

/// Writes the whole file at once. `summary` is that of the same record: its averaged rows bound the spectra.
/// FileError when it cannot be written; nothing is left then.
void write_archive(const std::string& path, const Deck& deck, const Record& record, const Summary& summary,
                   const WallBooks& books, const std::vector<Snapshot>& snapshots, double macro_weight,
                   const Provenance& provenance);

/// Names of the sectors of an electrode's book: "vane 0", "slot 0", ... or "sector 0", ... without vanes.
std::vector<std::string> sector_names(std::size_t sectors, int vane_count);

}  // namespace spokewright
