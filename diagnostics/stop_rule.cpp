// SPDX-License-Identifier: MIT
#include "diagnostics/stop_rule.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "diagnostics/flat_top.hpp"
#include "diagnostics/mode_watch.hpp"
#include "diagnostics/settling.hpp"
#include "fields/resonators.hpp"

namespace spokewright {
namespace {

constexpr double kLooks = 40;    // in a run of full length
constexpr double kMemories = 3;  // fill times of the resonators that the part kept must cover: e^-3 is 5 %
// A mode that is not noise (0.5 % of the anode voltage) and gains more than a tenth from the first to the last third of
// the part kept is on its way.
constexpr double kNoiseShare = 0.005;
constexpr double kGain = 1.1;
constexpr std::size_t kBatches = 10;  // of the growth fit
constexpr double kStudent99 = 2.896;  // one-sided 99 %, 8 degrees of freedom. M. Abramowitz & I. A. Stegun, table 26.10

double mean_of(std::span<const double> values) {
    double sum = 0;
    for (const double value : values) sum += value;
    return sum / static_cast<double>(values.size());
}

}  // namespace

Slope fitted_slope(std::span<const double> values) {
    const auto count = static_cast<double>(values.size());
    const double middle = 0.5 * (count - 1);
    const double centre = mean_of(values);
    double product = 0, squares = 0, rest = 0;
    for (std::size_t k = 0; k < values.size(); ++k) {
        const double x = static_cast<double>(k) - middle;
        product += x * (values[k] - centre);
        squares += x * x;
    }
    const double slope = product / squares;
    for (std::size_t k = 0; k < values.size(); ++k) {
        const double miss = values[k] - centre - slope * (static_cast<double>(k) - middle);
        rest += miss * miss;
    }
    return {slope, slope + kStudent99 * std::sqrt(rest / (count - 2) / squares)};
}

std::optional<std::string> StopRule::look(const Record& record) {
    if (deck_.clock.stop_half_width <= 0) return std::nullopt;
    const double now_ns = record.last("time_ns");
    if (!(now_ns >= next_look_ns_)) return std::nullopt;
    next_look_ns_ = now_ns + deck_.clock.end_time * 1e9 / kLooks;
    const std::string reason = verdict(record);
    const bool stands = !reason.empty();
    const bool twice = stands && stood_before_;
    stood_before_ = stands;
    return twice ? std::optional(reason) : std::nullopt;
}

double StopRule::memory_ns(const ModeEntry& mode) const {
    const double loss = 1 / mode.unloaded_q + load_admittance(deck_.load).real() / mode.external_q;
    return kMemories * 1e9 / (kPi * mode.frequency * loss);
}

std::string StopRule::verdict(const Record& record) const {
    const auto& time_ns = record.column("time_ns");
    const FlatTop flat = flat_top(deck_, time_ns);
    if (!flat.held || flat.first >= time_ns.size()) return "";
    if (deck_.prime.voltage > 0 && time_ns.back() < deck_.prime.time * 1e9) return "";
    const ModeWatch watch = watch_modes(deck_, record, false);
    if (watch.leading() == 0 && !deck_.circuit.modes.empty()) return skipped(record, flat.first);
    const double since_ns = watch.events().empty() ? 0 : watch.events().back().time_ns;
    return settled(record, flat.first, watch.leading(), since_ns);
}

std::string StopRule::settled(const Record& record, std::size_t first, int leading, double since_ns) const {
    const auto& time_ns = record.column("time_ns");
    const auto event =
        static_cast<std::size_t>(std::lower_bound(time_ns.begin(), time_ns.end(), since_ns) - time_ns.begin());
    const auto& current = record.column("anode_current_A");
    std::span<const double> energy;
    if (leading > 0) energy = record.mode_column(leading, "energy_J");
    const Settling settling = judge_settling(current, energy, first, event);
    if (!settling.settled) return "";
    const auto known = [&](const char* name) {
        const MeanWithError mean = batch_mean(std::span(record.column(name)).subspan(settling.kept_from));
        return mean.half_width <= deck_.clock.stop_half_width * std::abs(mean.mean);
    };
    if (!known("anode_current_A") || (leading > 0 && !known("mode_power_W"))) return "";
    const double kept_ns = time_ns.back() - time_ns[settling.kept_from];
    for (const ModeEntry& mode : deck_.circuit.modes) {
        if (mode.number == leading && kept_ns < memory_ns(mode)) return "";
    }
    if (other_mode_grows(record, settling.kept_from, leading)) return "";
    return fmt::format("settled, means known to {:.2g} %", 100 * deck_.clock.stop_half_width);
}

bool StopRule::other_mode_grows(const Record& record, std::size_t from, int leading) const {
    for (const ModeEntry& mode : deck_.circuit.modes) {
        if (mode.number == leading) continue;
        const auto kept = std::span(record.mode_column(mode.number, "voltage_V")).subspan(from);
        const double early = mean_of(kept.first(kept.size() / 3));
        const double late = mean_of(kept.last(kept.size() / 3));
        if (late > kNoiseShare * deck_.supply.anode_voltage && late > kGain * early) return true;
    }
    return false;
}

std::string StopRule::skipped(const Record& record, std::size_t first) const {
    const auto& time_ns = record.column("time_ns");
    const double threshold = kOscillationShare * deck_.supply.anode_voltage;
    const double from_ns = std::max(time_ns[first], deck_.prime.voltage > 0 ? deck_.prime.time * 1e9 : 0.0);
    const double seen_ns = time_ns.back() - from_ns;
    const double left_ns = deck_.clock.end_time * 1e9 - time_ns.back();
    for (const ModeEntry& mode : deck_.circuit.modes) {
        // Growth over the later half; before it, the hub fills and what was primed dies away.
        if (seen_ns < 2 * memory_ns(mode) || seen_ns * mode.frequency * 1e-9 < 4 * kDwellPeriods) return "";
        const auto& voltage = record.mode_column(mode.number, "voltage_V");
        const auto half = std::lower_bound(time_ns.begin(), time_ns.end(), from_ns + 0.5 * seen_ns) - time_ns.begin();
        const auto part = std::span(voltage).subspan(static_cast<std::size_t>(half));
        const std::size_t length = part.size() / kBatches;
        if (length == 0) return "";
        std::vector<double> logarithms;
        for (std::size_t k = 0; k < kBatches; ++k) {
            logarithms.push_back(std::log(std::max(mean_of(part.subspan(k * length, length)), 1e-12 * threshold)));
        }
        const double batch_ns = 0.5 * seen_ns / kBatches;
        const double now = std::log(std::max(*std::max_element(part.begin(), part.end()), 1e-12 * threshold));
        const double growth = std::max(fitted_slope(logarithms).upper, 0.0) / batch_ns;  // e-folds a ns
        if (now + growth * left_ns > std::log(threshold)) return "";
    }
    return fmt::format("no mode can reach {:.0f} % of the anode voltage before {:.0f} ns at the growth seen",
                       100 * kOscillationShare, deck_.clock.end_time * 1e9);
}

}  // namespace spokewright
