// SPDX-License-Identifier: MIT
#include <doctest/doctest.h>

#include <bit>
#include <cmath>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <string>
#include <vector>

#include "inputs/errors.hpp"
#include "pic/checkpoint.hpp"
#include "tests/coarse_tube.hpp"
#include "tests/scratch_folder.hpp"

using namespace spokewright;

namespace {

const std::string kDamaged = ": truncated or damaged: its checksum does not fit; make the file again";
const std::string kResolved =
    "[magnet]\n"
    "field_T = 0.185\n"
    "\n"
    "[clock]\n"
    "step_ps = 2\n"
    "end_time_ns = 100\n"
    "\n"
    "[output]\n"
    "checkpoint_interval_s = 600\n";

Deck deck_of(const std::string& resolved) {
    Deck deck = coarse_tube();
    deck.resolved_text = resolved;
    return deck;
}

/// 120 steps of the coarse tube with four samples and two snapshots.
Checkpoint example() {
    InteractionSpace space(coarse_tube(), 1);
    Record record(coarse_tube());
    Checkpoint checkpoint;
    for (int k = 1; k <= 120; ++k) {
        record.add(space.step());
        if (k % 30 == 0) record.sample(space.view());
        if (k % 60 == 0) checkpoint.snapshots.push_back(take_snapshot(space.view(), space.electrons()));
    }
    checkpoint.space = space.save();
    checkpoint.columns = record.columns();
    checkpoint.record_state = record.state();
    checkpoint.wall_clock = 1.0 / 3;
    return checkpoint;
}

const Checkpoint& the_example() {
    static const Checkpoint checkpoint = example();
    return checkpoint;
}

std::string written(const ScratchFolder& folder, const Checkpoint& checkpoint, const std::string& resolved) {
    const std::string path = folder.file("state.h5");
    write_checkpoint(path, deck_of(resolved), checkpoint, 60000);
    return path;
}

template <typename T>
std::string raw(const std::vector<T>& values) {
    return {reinterpret_cast<const char*>(values.data()), values.size() * sizeof(T)};
}

/// What reading says, without the name of the scratch folder; "" when it works.
std::string message_of(const ScratchFolder& folder, const std::string& path, const std::string& resolved) {
    const auto named = [&](const std::string& text) {
        const std::string prefix = folder.path().string() + "/";
        return text.starts_with(prefix) ? text.substr(prefix.size()) : text;
    };
    try {
        read_checkpoint(path, deck_of(resolved));
    } catch (const InputError& error) {
        return "input: " + named(error.what());
    } catch (const FileError& error) {
        return "file: " + named(error.what());
    }
    return "";
}

std::string message_for(const std::string& resolved) {
    const ScratchFolder folder;
    return message_of(folder, written(folder, the_example(), kResolved), resolved);
}

std::string replaced(std::string text, const std::string& old_part, const std::string& new_part) {
    const std::size_t at = text.find(old_part);
    REQUIRE(at != std::string::npos);
    return text.replace(at, old_part.size(), new_part);
}

std::string another(const std::string& there, const std::string& now) {
    return "input: state.h5: was made from another deck: '" + there + "' there, '" + now +
           "' now; --resume allows a new clock.end_time_ns, clock.stop_half_width_percent and [output] section";
}

}  // namespace

TEST_CASE("a checkpoint comes back to the last bit") {
    const ScratchFolder folder;
    Checkpoint went = the_example();
    REQUIRE(went.space.electrons.size() > 500);
    REQUIRE(went.space.books.cathode.hits() > 0);
    went.space.electrons.u_r[3] = -0.0f;
    went.columns[1].values[0] = std::bit_cast<double>(std::uint64_t{0x7ff8000000001234});  // a NaN with a mark
    const Checkpoint came = read_checkpoint(written(folder, went, kResolved), deck_of(kResolved));
    CHECK_UNARY(bytes_of(came.space) == bytes_of(went.space));
    CHECK(came.wall_clock == went.wall_clock);
    CHECK_UNARY(raw(came.record_state) == raw(went.record_state));
    REQUIRE(came.columns.size() == went.columns.size());
    for (std::size_t k = 0; k < came.columns.size(); ++k) {
        CHECK(came.columns[k].name == went.columns[k].name);
        CHECK(came.columns[k].unit == went.columns[k].unit);
        CHECK(came.columns[k].description == went.columns[k].description);
        CHECK_UNARY(raw(came.columns[k].values) == raw(went.columns[k].values));
    }
}

TEST_CASE("snapshots come back in order, to the last bit") {
    const ScratchFolder folder;
    Checkpoint went = the_example();
    // Eleven, so that an order by name ("10" before "2") shows.
    for (int k = 2; k < 11; ++k) {
        went.snapshots.push_back(went.snapshots[0]);
        went.snapshots.back().time = k * 1e-9;
    }
    const Checkpoint came = read_checkpoint(written(folder, went, kResolved), deck_of(kResolved));
    REQUIRE(came.snapshots.size() == 11);
    for (std::size_t k = 0; k < 11; ++k) {
        const Snapshot &a = came.snapshots[k], &b = went.snapshots[k];
        CHECK(a.time == b.time);
        CHECK(a.rows == 25);
        CHECK(a.columns == 80);
        CHECK_UNARY(raw(a.density) == raw(b.density));
        CHECK_UNARY(raw(a.potential) == raw(b.potential));
        CHECK_UNARY(raw(a.electrons.radius) == raw(b.electrons.radius));
        CHECK_UNARY(raw(a.electrons.theta) == raw(b.electrons.theta));
        CHECK_UNARY(raw(a.electrons.u_r) == raw(b.electrons.u_r));
        CHECK_UNARY(raw(a.electrons.u_theta) == raw(b.electrons.u_theta));
    }
}

TEST_CASE("a run goes on from the file as if it had never stopped") {
    const ScratchFolder folder;
    const Checkpoint came = read_checkpoint(written(folder, the_example(), kResolved), deck_of(kResolved));
    InteractionSpace resumed(coarse_tube(), 1), whole(coarse_tube(), 1);
    resumed.restore(came.space);
    for (int k = 0; k < 60; ++k) resumed.step();
    for (int k = 0; k < 180; ++k) whole.step();
    CHECK_UNARY(bytes_of(resumed.save()) == bytes_of(whole.save()));
}

TEST_CASE("an empty state is a state") {
    const ScratchFolder folder;
    Checkpoint empty;
    const Checkpoint came = read_checkpoint(written(folder, empty, kResolved), deck_of(kResolved));
    CHECK(came.space.electrons.size() == 0);
    CHECK(came.columns.empty());
    CHECK(came.snapshots.empty());
    CHECK_UNARY(bytes_of(came.space) == bytes_of(empty.space));
}

TEST_CASE("another end time and other output keys are the same run") {
    CHECK(message_for(kResolved) == "");
    CHECK(message_for(replaced(kResolved, "end_time_ns = 100", "end_time_ns = 200")) == "");
    CHECK(message_for(replaced(kResolved, "interval_s = 600", "interval_s = 60\nsnapshot_times_ns = 3 4")) == "");
    CHECK(message_for(replaced(kResolved, "checkpoint_interval_s = 600\n", "")) == "");
}

TEST_CASE("another deck is refused, with the first line that differs") {
    CHECK(message_for(replaced(kResolved, "field_T = 0.185", "field_T = 0.18")) ==
          another("field_T = 0.185", "field_T = 0.18"));
    CHECK(message_for(replaced(kResolved, "step_ps = 2", "step_ps = 3")) == another("step_ps = 2", "step_ps = 3"));
    CHECK(message_for(kResolved + "[electrons]\nseed = 2\n") == another("", "[electrons]"));
    CHECK(message_for("[magnet]\nfield_T = 0.185\n\n") == another("[clock]", ""));
}

TEST_CASE("a missing file is named") {
    const ScratchFolder folder;
    CHECK(message_of(folder, folder.file("gone.h5"), kResolved) ==
          "file: gone.h5: cannot read: No such file or directory");
}

TEST_CASE("a truncated or altered file is an error of the file, whatever the place") {
    const ScratchFolder folder;
    const std::string path = written(folder, the_example(), kResolved);
    std::ifstream file(path, std::ios::binary);
    const std::string good{std::istreambuf_iterator<char>(file), {}};
    const auto answer = [&](const std::string& bytes) {
        return message_of(folder, folder.write("state.h5", bytes), kResolved);
    };
    for (const std::size_t length :
         {std::size_t{0}, std::size_t{1}, std::size_t{100}, good.size() / 3, good.size() - 33, good.size() - 1}) {
        CAPTURE(length);
        CHECK(answer(good.substr(0, length)) == "file: state.h5" + kDamaged);
    }
    CHECK(answer(good + "x") == "file: state.h5" + kDamaged);
    for (std::size_t part = 0; part < 97; ++part) {
        std::string bytes = good;
        char& byte = bytes[good.size() * part / 97];
        byte = static_cast<char>(byte ^ (1 << part % 8));
        CAPTURE(part);
        CHECK(answer(bytes) == "file: state.h5" + kDamaged);
    }
    CHECK(answer(good) == "");
}

TEST_CASE("a whole file that is no checkpoint is an error of the file") {
    const ScratchFolder folder;
    const std::string path = folder.file("other.h5");
    Hdf5File file = Hdf5File::create(path);
    file.write_text("/deck/resolved", kResolved, "a deck and nothing else");
    file.commit();
    CHECK(message_of(folder, path, kResolved) ==
          "file: other.h5: dataset /clock/step is missing or damaged; make the file again");
}

TEST_CASE("a folder that takes no file is an error before anything is lost") {
    const ScratchFolder folder;
    CHECK_THROWS_AS(write_checkpoint(folder.file("no/state.h5"), deck_of(kResolved), the_example(), 60000), FileError);
    CHECK(std::filesystem::is_empty(folder.path()));
}
