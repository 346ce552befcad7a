// SPDX-License-Identifier: MIT
#include "diagnostics/archive.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "diagnostics/ledger.hpp"
#include "fields/fourier.hpp"
#include "fields/polar_grid.hpp"

namespace spokewright {
namespace {

void write_spectra(Hdf5File& file, const Deck& deck, const Record& record, const Summary& summary) {
    const std::size_t length = summary.averaged_to - summary.averaged_from;
    const auto averaged = [&](const std::vector<double>& column) {
        return std::span(column).subspan(summary.averaged_from, length);
    };
    if (length >= 2) {
        const double interval = (summary.averaged_to_ns - summary.averaged_from_ns) / static_cast<double>(length - 1);
        std::vector<double> frequency(length / 2 + 1);
        for (std::size_t k = 0; k < frequency.size(); ++k) {
            frequency[k] = static_cast<double>(k) / (static_cast<double>(length) * interval);
        }
        file.write("/spectra/frequency_GHz", frequency, {"GHz", "axis of the mode spectra"});
        for (const ModeEntry& mode : deck.circuit.modes) {
            file.write(fmt::format("/spectra/mode_{}_V", mode.number),
                       amplitude_spectrum(averaged(record.mode_column(mode.number, "re_V"))),
                       {"V", fmt::format("mode {}: amplitude spectrum of its vane voltage, averaged part, Hann window",
                                         mode.number)});
        }
    }
    std::vector<std::int32_t> harmonic;
    std::vector<double> charge;
    for (int m = 0; m <= record.charge_harmonics(); ++m) {
        harmonic.push_back(m);
        charge.push_back(batch_mean(averaged(record.column(fmt::format("charge_harmonic_{}_C", m)))).mean);
    }
    file.write("/spectra/azimuthal_harmonic", harmonic, {"1", "axis of azimuthal_charge_C"});
    file.write("/spectra/azimuthal_charge_C", charge,
               {"C", "mean amplitude of the harmonics of the charge beyond mid-gap, averaged part"});
}

void write_axes(Hdf5File& file, const Deck& deck) {
    const PolarGrid grid{deck.tube.cathode_radius, deck.tube.anode_radius, deck.tube.axial_height,
                         deck.grid.radial_cells, deck.grid.azimuthal_cells};
    std::vector<double> r, theta;
    for (int i = 0; i <= grid.n_r; ++i) r.push_back(grid.radius(i));
    for (int j = 0; j < grid.n_theta; ++j) theta.push_back(grid.theta(j));
    file.write("/axes/r_m", r, {"m", "radius of the nodes, cathode to anode"});
    file.write("/axes/theta_rad", theta, {"rad", "angle of the nodes; vane 0 is centred at 0"});
}

void write_ledger(Hdf5File& file, const Record& record, const Summary& summary) {
    const auto joule = [&](const char* name, double value, const char* text) {
        file.write_number(std::string("/ledger/") + name, value, {"J", text});
    };
    const RunningTotals& totals = record.totals();
    joule("supply_energy_J", totals.supply_energy, "delivered by the supply to the electrons since the start");
    joule("prime_energy_J", totals.prime_energy, "put into the resonators by priming since the start");
    joule("drive_energy_J", totals.drive_energy, "brought by the incident wave of a generator since the start");
    joule("emission_energy_J", totals.emission_energy, "kinetic energy of all emitted electrons");
    joule("mode_energy_J", totals.mode_energy, "given by the electrons to the resonators");
    joule("wall_loss_J", totals.wall_loss, "lost in the resonators' walls");
    joule("load_energy_J", totals.load_energy, "delivered to the load");
    joule("anode_energy_J", totals.anode_energy, "kinetic energy left on the anode");
    joule("cathode_energy_J", totals.cathode_energy, "kinetic energy left on the cathode");
    const EnergyBalance balance = energy_balance(record);
    joule("stored_energy_J", balance.stored_change, "in electrons, space charge and resonators at the last sample");
    file.write_number("/ledger/energy_imbalance", summary.energy_imbalance,
                      {"1", "open share of the input, the worse of whole run and averaged part"});
    file.write_number("/ledger/charge_imbalance_C", summary.charge_imbalance_C,
                      {"C", "largest difference between emitted less absorbed, stored and scattered charge"});
}

void write_origin(Hdf5File& file, const Deck& deck, double macro_weight, const Provenance& provenance) {
    file.write_text("/deck/text", deck.text, "the deck's file, byte for byte");
    file.write_text("/deck/resolved", deck.resolved_text, "every key with the value in force, itself a deck");
    file.write_texts("/deck/overrides", deck.overrides, "section.key=value from the command line, in order");
    file.write_text("/deck/sha256", deck.sha256, "of the text and the overrides");
    file.write_text("/provenance/program", "spokewright", "what made this file");
    file.write_text("/provenance/version", provenance.version, "version of the program");
    file.write_number("/provenance/seed", deck.electrons.seed, {"1", "seed of the random numbers"});
    file.write_number("/provenance/threads", provenance.threads,
                      {"1", "threads of the run; the result does not depend on it"});
    file.write_text("/provenance/build_flags", provenance.build_flags, "compiler and its flags");
    file.write_text("/provenance/finished_utc", provenance.finished_utc, "when this file was written");
    file.write_number("/provenance/macro_weight", macro_weight, {"1", "real electrons in one macro-electron"});
}

}  // namespace

std::vector<std::string> sector_names(std::size_t sectors, int vane_count) {
    const bool vanes = vane_count > 0 && sectors == 2 * static_cast<std::size_t>(vane_count);
    std::vector<std::string> names;
    for (std::size_t k = 0; k < sectors; ++k) {
        names.push_back(vanes ? fmt::format("{} {}", k % 2 == 0 ? "vane" : "slot", k / 2)
                              : fmt::format("sector {}", k));
    }
    return names;
}

void write_archive(const std::string& path, const Deck& deck, const Record& record, const Summary& summary,
                   const WallBooks& books, const std::vector<Snapshot>& snapshots, double macro_weight,
                   const Provenance& provenance) {
    Hdf5File file = Hdf5File::create(path);
    write_columns(file, "/series", record.columns());
    write_spectra(file, deck, record, summary);
    write_axes(file, deck);
    for (std::size_t k = 0; k < snapshots.size(); ++k)
        write_snapshot(file, fmt::format("/snapshots/{}", k), snapshots[k]);
    write_wall_book(file, "/walls/anode", books.anode,
                    sector_names(books.anode.sector_hits.size(), deck.tube.vane_count), macro_weight);
    write_wall_book(file, "/walls/cathode", books.cathode, sector_names(books.cathode.sector_hits.size(), 0),
                    macro_weight);
    write_ledger(file, record, summary);
    write_origin(file, deck, macro_weight, provenance);
    file.commit();
}

}  // namespace spokewright
