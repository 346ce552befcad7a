// SPDX-License-Identifier: MIT
// The keys of a deck that need more than one number and a range: programme, modes, priming, grid and the defaults
// that follow from other keys. Each works on a deck filled down to its own key, in the order of the key table.
// All throw BadValue.
#pragma once

#include <string>
#include <string_view>

#include "inputs/deck.hpp"

namespace spokewright {

void require_anode_outside_cathode(const Deck& deck);
void read_vane_count(Deck& deck, std::string_view text);

/// Pairs `time_ns:share` with strictly rising times.
void read_programme(Deck& deck, std::string_view text);
std::string programme_text(const Deck& deck);

/// A table relative to the folder of the deck.
void read_field_table_key(Deck& deck, std::string_view text);

/// kT of the cathode in eV.
std::string thermal_energy_text(const Deck& deck);

void read_circuit_source(Deck& deck, std::string_view text);
/// Makes one entry in deck.circuit.modes per number; the other lists fill them.
void read_mode_numbers(Deck& deck, std::string_view text);

void read_prime_mode(Deck& deck, std::string_view text);
/// N/2, or 0 (none) where there is no pi mode.
std::string pi_mode_text(const Deck& deck);
void require_primed_mode(const Deck& deck);

/// As for priming; a driven mode must be in the circuit and its load matched, for the generator is the load's other
/// end.
void read_drive_mode(Deck& deck, std::string_view text);
void require_driven_mode(const Deck& deck);
void read_drive_frequency(Deck& deck, std::string_view text);
std::string drive_frequency_text(const Deck& deck);

/// Cells no wider than the cathode's radius: the push counts on an electron not crossing the axis.
void read_radial_cells(Deck& deck, std::string_view text);
void read_azimuthal_cells(Deck& deck, std::string_view text);
std::string azimuthal_cells_text(const Deck& deck);

/// In ps, rounded down to four figures: the least of 0.1/omega_c, 1/60 of the shortest mode period and the time in
/// which an electron of full energy crosses 2 radial cells; without field and circuit 1/100 of its time across the gap.
/// On the knee of the example tubes: against a third of it, current and power differ by under 0.3 %, cathode heat by
/// under 2 % (README, "What a run depends on").
std::string step_text(const Deck& deck);

/// An end time that is within reach of the step.
void require_reachable_end(const Deck& deck);

void read_snapshot_times(Deck& deck, std::string_view text);

}  // namespace spokewright
