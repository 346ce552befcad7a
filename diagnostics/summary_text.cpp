// SPDX-License-Identifier: MIT
#include "diagnostics/summary_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>

namespace spokewright {

const char* const kSafetyNote =
    "A simulation, never a clearance. Magnetrons bring lethal voltage, microwave radiation, X-rays, strong magnets "
    "and, in "
    "some tubes, toxic beryllia ceramics: local codes and licensed practice decide.";

namespace {

using Json = nlohmann::ordered_json;
constexpr std::size_t kLines = 25;
constexpr std::size_t kColumns = 100;

Json number(double value) {
    return std::isfinite(value) ? Json(value) : Json(nullptr);
}

Json mean_json(const MeanWithError& value) {
    if (!std::isfinite(value.mean)) return nullptr;
    return {{"mean", value.mean}, {"ci95", number(value.half_width)}};
}

Json mode_json(const ModeSummary& mode) {
    return {{"mode", mode.mode},
            {"cold_frequency_GHz", mode.cold_frequency_GHz},
            {"hartree_voltage_V", number(mode.hartree_voltage_V)},
            {"voltage_V", mean_json(mode.voltage_V)},
            {"backward_V", mean_json(mode.backward_V)},
            {"energy_J", mean_json(mode.energy_J)}};
}

Json event_json(const ModeEvent& event) {
    const auto mode = [](int n) { return n > 0 ? Json(n) : Json(nullptr); };
    return {{"time_ns", event.time_ns}, {"kind", event.kind}, {"from", mode(event.from)}, {"to", mode(event.to)}};
}

/// Three digits and the prefix that fits, for voltages, currents, powers: "5.31 kW".
std::string quantity(double value, const char* unit) {
    if (!std::isfinite(value)) return "unknown";
    const double size = std::abs(value);
    if (size >= 999.5e3) return fmt::format("{:.3g} M{}", value * 1e-6, unit);
    if (size >= 999.5) return fmt::format("{:.3g} k{}", value * 1e-3, unit);
    if (size >= 0.9995 || size == 0) return fmt::format("{:.3g} {}", value, unit);
    if (size >= 0.9995e-3) return fmt::format("{:.3g} m{}", value * 1e3, unit);
    return fmt::format("{:.2g} u{}", value * 1e6, unit);
}

/// With its half-width as a share, which a reader can weigh at once: "1.65 A (+/- 0.8 %)".
std::string quantity(const MeanWithError& value, const char* unit) {
    const std::string text = quantity(value.mean, unit);
    if (!std::isfinite(value.half_width) || value.mean == 0) return text;
    return fmt::format("{} (+/- {:.2g} %)", text, 100 * value.half_width / std::abs(value.mean));
}

std::string percent(const MeanWithError& share) {
    if (!std::isfinite(share.mean)) return "unknown";
    if (!std::isfinite(share.half_width)) return fmt::format("{:.1f} %", 100 * share.mean);
    const int decimals = share.half_width > 0 && share.half_width < 0.001 ? 2 : 1;  // "+/- 0.0" would say: exact
    return fmt::format("{:.{}f} +/- {:.{}f} %", 100 * share.mean, decimals, 100 * share.half_width, decimals);
}

std::string mode_text(const Summary& s) {
    if (s.dominant_mode == 0) return "none oscillates";
    std::string text = fmt::format("{}{}", s.dominant_mode, s.pi_mode ? " (the pi mode)" : "");
    for (const ModeSummary& mode : s.modes) {
        if (mode.mode == s.dominant_mode) text += ", vane voltage " + quantity(mode.voltage_V, "V");
    }
    return text;
}

std::string spoke_text(const Summary& s) {
    const std::string hub =
        std::isfinite(s.hub_radius_mm.mean) ? fmt::format("{:.2f} mm", s.hub_radius_mm.mean) : "unknown";
    if (s.spoke_count == 0) return fmt::format("none; hub radius {}", hub);
    return fmt::format("{}, bunching {:.2f} of 1; hub radius {}", s.spoke_count, s.spoke_strength.mean, hub);
}

std::string frequency_text(const Summary& s) {
    if (!std::isfinite(s.frequency_GHz.mean)) return "none";
    return fmt::format("{:.5f} GHz, {:+.2f} MHz from the cold mode", s.frequency_GHz.mean, s.frequency_shift_MHz.mean);
}

std::string heat_text(const Summary& s) {
    std::string text =
        fmt::format("anode {}, cathode {}", quantity(s.anode_heat_W, "W"), quantity(s.cathode_heat_W, "W"));
    if (s.hottest_vane >= 0)
        text += fmt::format("; vane {} takes {:.1f} %", s.hottest_vane, 100 * s.hottest_vane_share);
    return text;
}

std::string threshold_text(const Summary& s) {
    const std::string hull = quantity(s.hull_voltage_V, "V");
    if (!std::isfinite(s.hartree_voltage_V)) return fmt::format("Hull {}", hull);
    return fmt::format("Hull {}, Hartree {} ({})", hull, quantity(s.hartree_voltage_V, "V"),
                       s.dominant_mode > 0 ? fmt::format("mode {}", s.dominant_mode) : "the pi mode");
}

std::string event_text(const ModeEvent& event) {
    if (event.kind == "mode skip") return fmt::format("mode skip: no mode had started by {:.1f} ns", event.time_ns);
    const auto mode = [](int n) { return n > 0 ? fmt::format("mode {}", n) : std::string("none"); };
    return fmt::format("{} at {:.1f} ns, {} to {}", event.kind, event.time_ns, mode(event.from), mode(event.to));
}

std::string balance_text(const Summary& s) {
    const std::string energy =
        std::isfinite(s.energy_imbalance) ? fmt::format("{:.2g} % of the input", 100 * s.energy_imbalance) : "unknown";
    return fmt::format("energy open by {}, charge by {:.2g} C", energy, s.charge_imbalance_C);
}

std::string status_text(const Summary& s) {
    if (!std::isfinite(s.averaged_from_ns)) return fmt::format("{}, {:.1f} ns of tube time", s.status, s.end_time_ns);
    return fmt::format("{}; means from {:.1f} to {:.1f} ns of {:.1f} ns", s.status, s.averaged_from_ns,
                       s.averaged_to_ns, s.end_time_ns);
}

/// Cut at a character, not inside one.
std::string shortened(std::string text) {
    if (text.size() <= kColumns) return text;
    std::size_t end = kColumns - 3;
    while (end > 0 && (static_cast<unsigned char>(text[end]) & 0xC0) == 0x80) --end;
    return text.substr(0, end) + "...";
}

/// Appends a text under a heading, broken at blanks into lines of kColumns.
void append_wrapped(std::vector<std::string>& lines, const std::string& heading, const std::string& text) {
    constexpr std::size_t kIndent = 13;
    std::string line = fmt::format("{:<{}}", heading, kIndent);
    std::size_t start = 0;
    while (start < text.size()) {
        const std::size_t blank = std::min(text.find(' ', start), text.size());
        const bool fresh = line.size() == kIndent;
        if (!fresh && line.size() + 1 + blank - start > kColumns) {
            lines.push_back(line);
            line.assign(kIndent, ' ');
        } else if (!fresh) {
            line += ' ';
        }
        line += text.substr(start, blank - start);
        start = blank + 1;
    }
    lines.push_back(line);
}

/// As many of the notes as the lines left allow, and a word about the rest.
void append_notes(std::vector<std::string>& lines, const std::string& heading, const std::vector<std::string>& notes,
                  std::size_t last_line) {
    for (std::size_t k = 0; k < notes.size(); ++k) {
        std::vector<std::string> wrapped;
        append_wrapped(wrapped, heading, notes[k]);
        const std::size_t reserve = k + 1 < notes.size() ? 1 : 0;  // for the word about the rest
        if (lines.size() + wrapped.size() + reserve > last_line) {
            append_wrapped(lines, heading, fmt::format("{} more in summary.json", notes.size() - k));
            return;
        }
        lines.insert(lines.end(), wrapped.begin(), wrapped.end());
    }
}

}  // namespace

Json summary_json(const Summary& s) {
    Json modes = Json::array();
    for (const ModeSummary& mode : s.modes) modes.push_back(mode_json(mode));
    Json events = Json::array();
    for (const ModeEvent& event : s.mode_events) events.push_back(event_json(event));
    const auto count = [](int value) { return value > 0 ? Json(value) : Json(nullptr); };
    return {{"program", "spokewright"},
            {"version", s.version},
            {"deck_sha256", s.deck_sha256},
            {"seed", s.seed},
            {"status", s.status},
            {"settled_from_ns", number(s.settled_from_ns)},
            {"averaged_from_ns", number(s.averaged_from_ns)},
            {"averaged_to_ns", number(s.averaged_to_ns)},
            {"end_time_ns", number(s.end_time_ns)},
            {"early_end", s.early_end.empty() ? Json(nullptr) : Json(s.early_end)},
            {"anode_voltage_V", mean_json(s.anode_voltage_V)},
            {"anode_current_A", mean_json(s.anode_current_A)},
            {"emitted_current_A", mean_json(s.emitted_current_A)},
            {"cathode_return_current_A", mean_json(s.cathode_return_current_A)},
            {"input_power_W", mean_json(s.input_power_W)},
            {"rf_power_W", mean_json(s.rf_power_W)},
            {"load_power_W", mean_json(s.load_power_W)},
            {"wall_loss_W", mean_json(s.wall_loss_W)},
            {"anode_heat_W", mean_json(s.anode_heat_W)},
            {"cathode_heat_W", mean_json(s.cathode_heat_W)},
            {"electronic_efficiency", mean_json(s.electronic_efficiency)},
            {"total_efficiency", mean_json(s.total_efficiency)},
            {"dominant_mode", count(s.dominant_mode)},
            {"spoke_count", count(s.spoke_count)},
            {"spoke_strength", mean_json(s.spoke_strength)},
            {"hub_radius_mm", mean_json(s.hub_radius_mm)},
            {"frequency_GHz", mean_json(s.frequency_GHz)},
            {"frequency_shift_MHz", mean_json(s.frequency_shift_MHz)},
            {"drive_power_W", s.drive_power_W},
            {"drive_frequency_GHz", number(s.drive_frequency_GHz)},
            {"locked", s.drive_power_W > 0 ? Json(s.locked) : Json(nullptr)},
            {"modes", modes},
            {"mode_events", events},
            {"energy_imbalance", number(s.energy_imbalance)},
            {"charge_imbalance_C", s.charge_imbalance_C},
            {"hull_voltage_V", number(s.hull_voltage_V)},
            {"hartree_voltage_V", number(s.hartree_voltage_V)},
            {"electrons", s.electrons},
            {"steps", s.steps},
            {"wall_clock_s", s.wall_clock_s},
            {"ns_per_electron_step", number(s.ns_per_electron_step)},
            {"warnings", s.warnings},
            {"safety", kSafetyNote}};
}

std::string summary_file_text(const Summary& summary) {
    return summary_json(summary).dump(2, ' ', false, Json::error_handler_t::replace) + "\n";
}

std::vector<std::string> summary_lines(const Summary& s) {
    std::vector<std::string> lines;
    const auto add = [&](const char* heading, const std::string& text) {
        lines.push_back(shortened(fmt::format("{:<13}{}", heading, text)));
    };
    add("status", status_text(s));
    if (!s.early_end.empty()) append_wrapped(lines, "ended early", s.early_end);
    add("current", fmt::format("{} at {}", quantity(s.anode_current_A, "A"), quantity(s.anode_voltage_V.mean, "V")));
    add("input", quantity(s.input_power_W, "W"));
    add("power", fmt::format("{} from the electrons: {} to the load, {} to the walls", quantity(s.rf_power_W, "W"),
                             quantity(s.load_power_W.mean, "W"), quantity(s.wall_loss_W.mean, "W")));
    add("efficiency",
        fmt::format("{} electronic, {} in total", percent(s.electronic_efficiency), percent(s.total_efficiency)));
    add("mode", mode_text(s));
    add("spokes", spoke_text(s));
    add("frequency", frequency_text(s));
    if (s.drive_power_W > 0) {
        add("generator", fmt::format("{} at {:.6g} GHz; the tube {} to it", quantity(s.drive_power_W, "W"),
                                     s.drive_frequency_GHz, s.locked ? "has locked" : "has not locked"));
    }
    add("heat", heat_text(s));
    add("cathode", fmt::format("emits {}, takes back {}", quantity(s.emitted_current_A.mean, "A"),
                               quantity(s.cathode_return_current_A.mean, "A")));
    add("thresholds", threshold_text(s));
    add("balance", balance_text(s));
    add("run", fmt::format("{} steps, {:.0f} macro-electrons at the end, {:.1f} s, {:.2f} ns per electron and step",
                           s.steps, s.electrons, s.wall_clock_s, s.ns_per_electron_step));
    std::vector<std::string> events;
    for (const ModeEvent& event : s.mode_events) events.push_back(event_text(event));
    append_notes(lines, "event", events, lines.size() + 4);
    append_notes(lines, "warning", s.warnings, kLines - 1);
    lines.push_back(
        "A simulation, never a clearance: local codes and licensed practice decide what may be switched on.");
    return lines;
}

}  // namespace spokewright
