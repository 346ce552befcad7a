// SPDX-License-Identifier: MIT
// One run in numbers: what the tube did, how sure that is, and whether the books balance. Names carry their units as in
// summary.json. NaN stands for "undefined" (null in the file).
#pragma once

#include <cstddef>
#include <cstdint>
#include <limits>
#include <string>
#include <vector>

#include "diagnostics/mode_watch.hpp"
#include "diagnostics/record.hpp"
#include "diagnostics/settling.hpp"
#include "diagnostics/wall_books.hpp"
#include "inputs/deck.hpp"

namespace spokewright {

inline constexpr double kUndefined = std::numeric_limits<double>::quiet_NaN();
inline constexpr MeanWithError kUndefinedMean{kUndefined, kUndefined};

/// What only the one who turned the clock knows.
struct RunFacts {
    std::string version;
    std::int64_t steps = 0;  // since the start, earlier legs included
    double wall_clock = 0;   // s
    double ns_per_electron_step = 0;
    double macro_weight = 0;            // real electrons in one macro-electron
    bool interrupted = false;           // stopped by a signal before the end time
    std::string early_end;              // why the stop rule ended the run, empty if it did not
    std::vector<std::string> warnings;  // from the start checks and the run
};

struct ModeSummary {
    int mode;
    double cold_frequency_GHz;
    double hartree_voltage_V;
    MeanWithError voltage_V;  // forward wave
    MeanWithError backward_V;
    MeanWithError energy_J;
};

struct Summary {
    std::string version, deck_sha256;
    std::uint64_t seed = 0;
    std::string status;  // "settled", "not settled", "no oscillation", "cut off"
    double settled_from_ns = kUndefined, end_time_ns = 0;
    std::string early_end;  // why the run ended before the deck's end time, empty if it did not
    MeanWithError anode_voltage_V, anode_current_A, emitted_current_A, cathode_return_current_A;
    MeanWithError input_power_W, rf_power_W, load_power_W, wall_loss_W, anode_heat_W, cathode_heat_W;
    MeanWithError electronic_efficiency, total_efficiency;  // rf / input, load / input
    int dominant_mode = 0;                                  // 0 = none
    int spoke_count = 0;                                    // 0 = none
    MeanWithError spoke_strength = kUndefinedMean;          // |Q_m| / Q_0 beyond mid-gap: 0 even ring, 1 thin spokes
    MeanWithError hub_radius_mm, frequency_GHz = kUndefinedMean, frequency_shift_MHz = kUndefinedMean;
    double drive_power_W = 0;  // of a generator at drive_frequency_GHz, 0 without
    double drive_frequency_GHz = kUndefined;
    bool locked =
        false;  // at the end the driven mode runs at the generator's frequency, to 5 % of the locking half band
    std::vector<ModeSummary> modes;
    std::vector<ModeEvent> mode_events;
    double energy_imbalance = kUndefined;  // the worse of the whole run and the averaged part
    double charge_imbalance_C = 0;
    double hull_voltage_V = 0, hartree_voltage_V = kUndefined;  // of the dominant, else of the pi mode
    double electrons = 0;                                       // macro-electrons in flight at the end
    std::int64_t steps = 0;
    double wall_clock_s = 0, ns_per_electron_step = 0;
    std::vector<std::string> warnings;

    // Not in summary.json:
    std::size_t averaged_from = 0, averaged_to = 0;  // rows [from, to) of the record behind every mean
    double averaged_from_ns = kUndefined, averaged_to_ns = kUndefined;
    int hottest_vane = -1;          // -1 = no hits or no vanes
    double hottest_vane_share = 0;  // of the anode's heat
    bool pi_mode = false;           // the dominant mode is the pi mode
};

/// Means are taken over the settled part, or over the second half at the final voltage when the run has not settled.
/// A pulse is judged on its last flat top. Never throws on a short record: what cannot be said is undefined.
Summary summarise(const Deck& deck, const Record& record, const WallBooks& books, const RunFacts& facts);

}  // namespace spokewright
