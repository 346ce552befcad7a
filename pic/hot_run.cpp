// SPDX-License-Identifier: MIT
#include "pic/hot_run.hpp"

#include <fmt/chrono.h>
#include <fmt/format.h>
#include <omp.h>

#include <algorithm>
#include <chrono>
#include <cmath>
#include <filesystem>
#include <optional>

#include "diagnostics/archive.hpp"
#include "diagnostics/mode_watch.hpp"
#include "diagnostics/start_checks.hpp"
#include "diagnostics/stop_rule.hpp"
#include "diagnostics/summary_text.hpp"
#include "diagnostics/whole_file.hpp"
#include "inputs/errors.hpp"
#include "pic/checkpoint.hpp"
#include "pic/stop_signal.hpp"

namespace spokewright {
namespace {

constexpr int kFiniteEvery = 256;  // steps between looks for non-finite numbers: under 1 % of the time

double seconds() {
    return std::chrono::duration<double>(std::chrono::steady_clock::now().time_since_epoch()).count();
}

struct Files {
    explicit Files(const std::string& folder)
        : archive(folder + "/run.h5"), summary(folder + "/summary.json"), state(folder + "/state.h5") {}
    std::string archive, summary, state;
};

/// Makes the folder and finds out, before hours are spent, whether the result may go there.
void prepare_folder(const RunOptions& options, const Files& files) {
    std::error_code error;
    if (options.resume && !std::filesystem::exists(files.state, error)) {
        throw FileError(
            fmt::format("{}: no state.h5 to go on from; leave --resume out to start the run", options.folder));
    }
    std::filesystem::create_directories(options.folder, error);
    if (error) {
        throw FileError(fmt::format("{}: cannot be made: {}; give --out a folder that may be written", options.folder,
                                    error.message()));
    }
    for (const std::string& file : {files.archive, files.summary, files.state}) {
        const bool taken = std::filesystem::exists(file, error);
        if (taken && !options.resume && !options.replace) {
            throw FileError(fmt::format("{}: holds a result already; --resume goes on with it, --replace does it anew",
                                        options.folder));
        }
        if (taken && !std::filesystem::is_regular_file(file, error)) {
            throw FileError(fmt::format("{}: is not a file and cannot be replaced; move it away", file));
        }
    }
    const std::string trial =
        options.folder + "/.spokewright-trial";  // permissions do not tell all: a disk may be full
    write_whole_file(trial, "may be removed\n");
    std::filesystem::remove(trial, error);
}

/// The run in progress: what the loop below changes.
class Leg {
public:
    Leg(const Deck& deck, const RunOptions& options)
        : deck_(deck),
          space_(deck, options.threads),
          record_(deck),
          watch_(deck),
          stop_rule_(deck),
          started_(seconds()) {}

    void resume(const Checkpoint& checkpoint) {
        space_.restore(checkpoint.space);
        record_.restore(checkpoint.columns, checkpoint.record_state);
        watch_ = watch_modes(deck_, record_, false);
        snapshots_ = checkpoint.snapshots;
        earlier_wall_clock_ = checkpoint.wall_clock;
        step_ = checkpoint.space.step;
    }

    /// Steps to the end time or to a signal. `keep` is called when a checkpoint is due.
    template <class Keep>
    void run(Progress& progress, const Keep& keep) {
        const auto last = static_cast<std::int64_t>(std::ceil(deck_.clock.end_time / deck_.clock.step - 1e-9));
        double kept_at = seconds();
        while (step_ < last && stop_signal() == 0 && !early_end_) {
            record_.add(space_.step());
            ++step_;
            if (step_ % deck_.clock.sample_every == 0 || step_ == last) {
                sample(progress);
            }
            if (step_ % kFiniteEvery == 0) {
                require_finite();
            }
            take_due_snapshot();
            const double interval = deck_.output.checkpoint_interval;
            if (interval > 0 && seconds() - kept_at > interval) {
                keep();
                kept_at = seconds();
            }
        }
        require_finite();
        if (step_ > 0 && (snapshots_.empty() || snapshots_.back().time < space_.time())) {
            final_snapshot_ = take_snapshot(space_.view(), space_.electrons());
        }
        progress.finish(progress_state());
    }

    Checkpoint checkpoint() const {
        return {space_.save(), record_.columns(), record_.state(), snapshots_, wall_clock()};
    }

    RunFacts facts(const std::vector<std::string>& warnings) const {
        RunFacts facts;
        facts.version = SPOKEWRIGHT_VERSION;
        facts.steps = step_;
        facts.wall_clock = wall_clock();
        const double electron_steps = record_.totals().electron_steps;
        facts.ns_per_electron_step = electron_steps > 0 ? wall_clock() * 1e9 / electron_steps : kUndefined;
        facts.macro_weight = space_.macro_weight();
        facts.interrupted = stop_signal() != 0;
        facts.early_end = early_end_.value_or("");
        facts.warnings = warnings;
        return facts;
    }

    std::vector<Snapshot> snapshots() const {
        std::vector<Snapshot> all = snapshots_;
        if (!final_snapshot_.density.empty()) {
            all.push_back(final_snapshot_);
        }
        return all;
    }

    const Record& record() const { return record_; }
    double macro_weight() const { return space_.macro_weight(); }

private:
    double wall_clock() const { return earlier_wall_clock_ + seconds() - started_; }

    void sample(Progress& progress) {
        const SpaceView view = space_.view();
        record_.sample(view);
        voltages_.clear();
        energies_.clear();
        for (const ModeState& mode : view.modes) {
            voltages_.push_back(std::abs(mode.forward));
            energies_.push_back(mode.energy);
        }
        watch_.observe(view.time * 1e9, voltages_, energies_);
        early_end_ = stop_rule_.look(record_);
        progress.update(progress_state());
    }

    ProgressState progress_state() const {
        const double current = record_.samples() > 0 ? record_.last("anode_current_A") : 0;
        return {space_.time(), deck_.clock.end_time, space_.tally().electrons, current, watch_.leading()};
    }

    void take_due_snapshot() {
        const auto due = [&](double time) {
            return time > 0 && time <= space_.time() + 1e-6 * deck_.clock.step &&
                   time > space_.time() - (1 - 1e-6) * deck_.clock.step;
        };
        const auto& times = deck_.output.snapshot_times;
        if (std::any_of(times.begin(), times.end(), due)) {
            snapshots_.push_back(take_snapshot(space_.view(), space_.electrons()));
        }
    }

    void require_finite() const {
        if (!space_.finite()) {
            throw NumericsError(fmt::format(
                "at {:.3f} ns a field, voltage or momentum is no longer a finite number; lower clock.step_ps (now "
                "{:.3g}) or check the circuit's values",
                space_.time() * 1e9, deck_.clock.step * 1e12));
        }
    }

    const Deck& deck_;
    InteractionSpace space_;
    Record record_;
    ModeWatch watch_;
    StopRule stop_rule_;
    std::optional<std::string> early_end_;
    std::vector<Snapshot> snapshots_;
    Snapshot final_snapshot_;
    std::vector<double> voltages_, energies_;
    std::int64_t step_ = 0;
    double started_;
    double earlier_wall_clock_ = 0;
};

std::string utc_now() {
    return fmt::format("{:%Y-%m-%dT%H:%M:%SZ}",
                       fmt::gmtime(std::chrono::system_clock::to_time_t(std::chrono::system_clock::now())));
}

}  // namespace

int default_threads(const Deck& deck) {
    return static_cast<int>(std::clamp<std::int64_t>(deck.electrons.target_count / 50000, 1, omp_get_num_procs()));
}

std::vector<std::string> check_deck(const Deck& deck) {
    std::vector<std::string> warnings;
    std::string fatal;
    for (const Finding& finding : start_checks(deck)) {
        if (finding.fatal) {
            fatal += fmt::format("{}{}: {}", fatal.empty() ? "" : "\n", deck.path, finding.text);
        } else {
            warnings.push_back(finding.text);
        }
    }
    if (!fatal.empty()) {
        throw InputError(fatal);
    }
    return warnings;
}

RunOutcome hot_run(const Deck& deck, const RunOptions& options, Progress& progress,
                   const std::vector<std::string>& warnings) {
    const Files files(options.folder);
    prepare_folder(options, files);
    Leg leg(deck, options);
    if (options.resume) {
        leg.resume(read_checkpoint(files.state, deck));
    }
    const auto keep = [&] { write_checkpoint(files.state, deck, leg.checkpoint(), leg.macro_weight()); };
    leg.run(progress, keep);

    RunOutcome outcome;
    outcome.signal = stop_signal();
    const Checkpoint end = leg.checkpoint();
    outcome.summary = summarise(deck, leg.record(), end.space.books, leg.facts(warnings));
    write_checkpoint(files.state, deck, end, leg.macro_weight());
    write_archive(files.archive, deck, leg.record(), outcome.summary, end.space.books, leg.snapshots(),
                  leg.macro_weight(), {SPOKEWRIGHT_VERSION, options.threads, SPOKEWRIGHT_BUILD, utc_now()});
    write_whole_file(files.summary, summary_file_text(outcome.summary));
    return outcome;
}

}  // namespace spokewright
