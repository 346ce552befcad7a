// SPDX-License-Identifier: MIT
#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <filesystem>

#include "diagnostics/archive.hpp"
#include "inputs/errors.hpp"
#include "tests/played_run.hpp"
#include "tests/relative_error.hpp"
#include "tests/scratch_folder.hpp"

using namespace spokewright;

namespace {

WallBook book(std::size_t sectors) {
    WallBook book;
    book.energy_range = 5000;
    for (std::size_t k = 0; k < sectors; ++k) {
        book.sector_hits.push_back(static_cast<std::int64_t>(3 + k));
        book.sector_energy.push_back(static_cast<std::int64_t>(1024 * (100 + k)));
    }
    book.energy_histogram.assign(WallBook::kEnergyBins, 2);
    return book;
}

Snapshot snapshot() {
    Snapshot snapshot;
    snapshot.time = 3e-9;
    snapshot.rows = 9;
    snapshot.columns = 40;
    for (int k = 0; k < 9 * 40; ++k) {
        snapshot.density.push_back(k);
        snapshot.potential.push_back(-k);
    }
    snapshot.electrons = {{1, 2}, {3, 4}, {5, 6}, {7, 8}};
    return snapshot;
}

/// Every dataset below a group, by path.
std::vector<std::string> datasets(const Hdf5File& file, const std::string& group) {
    std::vector<std::string> found;
    for (const std::string& name : file.list(group.empty() ? "/" : group)) {
        const std::string path = group + "/" + name;
        const auto below = datasets(file, path);
        if (below.empty()) found.push_back(path);
        found.insert(found.end(), below.begin(), below.end());
    }
    return found;
}

/// A run of 20 ns with two snapshots, archived at `path`.
Record write_example(const std::string& path) {
    PlayedRun run;
    run.deck.text = "[tube]\n";
    run.deck.overrides = {"supply.anode_voltage_V=4200"};
    run.books = {book(20), book(40)};
    Record record(run.deck);
    run.play(record, 20e-9);
    const Summary summary = summarise(run.deck, record, run.books, {});
    write_archive(path, run.deck, record, summary, run.books, {snapshot(), snapshot()}, 60000,
                  {"0.1.0", 2, "flags", "2000-01-01T00:00:00Z"});
    return record;
}

}  // namespace

TEST_CASE("an archive holds the run, and every dataset its unit and description") {
    const ScratchFolder folder;
    const Record record = write_example(folder.file("run.h5"));
    const Hdf5File file = Hdf5File::open(folder.file("run.h5"));
    const auto all = datasets(file, "");
    CHECK(all.size() > 80);
    for (const std::string& name : all) {
        CHECK_FALSE(file.label(name).unit.empty());
        CHECK_FALSE(file.label(name).description.empty());
    }
    CHECK(file.read<double>("/series/anode_current_A") == record.column("anode_current_A"));
    CHECK(file.read<double>("/axes/r_m").size() == 9);
    CHECK(file.read_text("/deck/text") == "[tube]\n");
    CHECK(file.read_texts("/deck/overrides").at(0) == "supply.anode_voltage_V=4200");
    CHECK(file.read_number<std::int64_t>("/provenance/threads") == 2);
    CHECK(file.read_texts("/walls/anode/sector").at(3) == "slot 1");
    CHECK(relative_error(file.read<double>("/walls/anode/energy_J").at(2), 102 * 60000 * kElementaryCharge) < 1e-12);
    CHECK(relative_error(file.read<double>("/walls/anode/charge_C").at(2), -5 * 60000 * kElementaryCharge) < 1e-12);
    CHECK(file.shape("/snapshots/1/density_per_m3") == std::vector<std::size_t>{9, 40});
}

TEST_CASE("the spectrum of a mode peaks at its frequency with its amplitude") {
    const ScratchFolder folder;
    write_example(folder.file("run.h5"));
    const Hdf5File file = Hdf5File::open(folder.file("run.h5"));
    const auto frequency = file.read<double>("/spectra/frequency_GHz");
    const auto amplitude = file.read<double>("/spectra/mode_5_V");
    REQUIRE(frequency.size() == amplitude.size());
    const auto peak = std::max_element(amplitude.begin(), amplitude.end()) - amplitude.begin();
    const double bin = frequency[1];
    CHECK(std::abs(frequency[static_cast<std::size_t>(peak)] - 2.449) <= 0.5 * bin * 1.001);
    // Between bins a Hann window loses up to 15 % (F. J. Harris, Proc. IEEE 66, 51 (1978): 1.42 dB).
    CHECK(amplitude[static_cast<std::size_t>(peak)] > 0.84 * 2000);
    CHECK(amplitude[static_cast<std::size_t>(peak)] < 1.01 * 2000);
    const auto charge = file.read<double>("/spectra/azimuthal_charge_C");
    CHECK(relative_error(charge.at(5) / charge.at(0), 0.4) < 1e-9);
}

TEST_CASE("columns, books and snapshots come back as they went") {
    const ScratchFolder folder;
    const Record record = write_example(folder.file("run.h5"));
    const Hdf5File file = Hdf5File::open(folder.file("run.h5"));
    Record again(played_deck());
    again.restore(read_columns(file, "/series"), record.state());  // names and order fit
    CHECK(again.column("hub_radius_mm") == record.column("hub_radius_mm"));
    CHECK(again.columns().front().description == record.columns().front().description);
    const WallBook back = read_wall_book(file, "/walls/cathode");
    CHECK(back.energy_range == 5000);
    CHECK(back.sector_hits == book(40).sector_hits);
    CHECK(back.sector_energy == book(40).sector_energy);
    CHECK(back.energy_histogram == book(40).energy_histogram);
    const Snapshot seen = read_snapshot(file, "/snapshots/0");
    CHECK(seen.time == 3e-9);
    CHECK(seen.potential == snapshot().potential);
    CHECK(seen.rows == 9);
    CHECK(seen.columns == 40);
    CHECK(seen.electrons.u_theta == std::vector<float>{7, 8});
}

TEST_CASE("a snapshot's density is charge over volume and electron charge") {
    const PolarGrid grid{1e-3, 2e-3, 1e-2, 2, 4};
    std::vector<double> charge(grid.nodes());
    std::vector<double> potential(grid.nodes(), 7.0);
    charge[grid.node(1, 2)] = -kElementaryCharge * 1e6;
    const WallBooks books;
    const Snapshot taken = take_snapshot({0, grid, -1, 1, charge, potential, {}, 0, 0, 0, 0, 0, 0, books}, {});
    // Row 1 owns the ring between the middles of its cells: here 1 to 2 mm weighted by halves, 1/4 turn, 1 cm high.
    CHECK(relative_error(taken.density[grid.node(1, 2)], 1e6 / (0.25 * 3e-6 * (kPi / 2) * 1e-2)) < 1e-12);
    CHECK(taken.density[grid.node(1, 1)] == 0);
    CHECK(taken.potential == potential);
}

TEST_CASE("an archive of an empty run is still a file; an unwritable one is an error and leaves nothing") {
    const ScratchFolder folder;
    const Deck deck = played_deck();
    const Record record(deck);
    const Summary summary = summarise(deck, record, {}, {});
    write_archive(folder.file("e.h5"), deck, record, summary, {}, {}, 1, {});
    CHECK(Hdf5File::open(folder.file("e.h5")).read<double>("/series/time_ns").empty());
    CHECK_THROWS_AS(write_archive(folder.file("no/e.h5"), deck, record, summary, {}, {}, 1, {}), FileError);
    CHECK(std::distance(std::filesystem::directory_iterator(folder.path()), {}) == 1);
}
