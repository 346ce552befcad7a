// SPDX-License-Identifier: MIT
#include "diagnostics/chart_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>
#include <string_view>

#include "diagnostics/chart_rows.hpp"
#include "diagnostics/summary_text.hpp"

namespace spokewright {
namespace {

using Json = nlohmann::ordered_json;
constexpr std::size_t kColumns = 100;

Json number(double value) {
    return std::isfinite(value) ? Json(value) : Json(nullptr);
}

/// `text` after `head`, broken at blanks into lines that all begin where `head` ends.
void append_wrapped(std::vector<std::string>& lines, const std::string& head, std::string_view text) {
    std::string line = head;
    while (!text.empty()) {
        const std::size_t blank = std::min(text.find(' '), text.size());
        const bool fresh = line.size() == head.size();
        if (!fresh && line.size() + 1 + blank > kColumns) {
            lines.push_back(line);
            line.assign(head.size(), ' ');
        } else if (!fresh) {
            line += ' ';
        }
        line += text.substr(0, blank);
        text.remove_prefix(std::min(blank + 1, text.size()));
    }
    line.erase(line.find_last_not_of(' ') + 1);
    lines.push_back(line);
}

std::string row_figure(const ChartRow& row, double value) {
    const bool percent = std::string_view(row.unit) == "%";
    return percent && std::isfinite(value) ? fmt::format("{:.2f}", value) : figure(value);
}

void append_row(std::vector<std::string>& lines, const ChartRow& row) {
    const bool known = std::isfinite(row.value);
    append_wrapped(lines,
                   fmt::format("  {:<32}{:>10} {:>10} {:<4}{:<4}", row.label, row_figure(row, row.value),
                               std::isfinite(row.nonrelativistic) ? row_figure(row, row.nonrelativistic) : "",
                               known ? row.unit : "", row.source > 0 ? fmt::format("[{}]", row.source) : ""),
                   row.note);
}

/// The values that differ without relativity, "non-rel. V0 3690, Hartree 20412".
std::string nonrelativistic_text(const ChartWave& wave) {
    std::string text;
    const auto add = [&](const char* name, const ChartValue& value, double scale) {
        const double other = scale * nonrelativistic_worth_showing(value);
        if (std::isfinite(other))
            text += fmt::format("{}{} {}", text.empty() ? "non-rel. " : ", ", name, figure(other));
    };
    add("V0", wave.synchronous_voltage, 1);
    add("B0", wave.synchronous_field, 1e3);
    add("Hartree", wave.hartree_voltage, 1);
    return text;
}

void append_waves(std::vector<std::string>& lines, const Chart& chart) {
    lines.push_back("Every mode and its first space harmonics, m = n + k N [5]");
    if (chart.waves.empty()) {
        lines.push_back("  none: " + chart.no_pi_mode);
        return;
    }
    lines.push_back(fmt::format("  {:>2} {:>3} {:>4} {:>9} {:>9} {:>9} {:>10} {:>9}", "n", "k", "m", "f, GHz", "V0, V",
                                "B0, mT", "Hartree, V", "above it"));
    bool out_of_step = false;
    for (const ChartWave& wave : chart.waves) {
        const double threshold = wave.hartree_voltage.value;
        out_of_step |= std::isnan(threshold);
        const std::string over =
            std::isnan(threshold)
                ? "-"
                : fmt::format("{:+.1f} %", 100 * (chart.voltage / threshold - 1));  // of the threshold
        const std::string head =
            fmt::format("  {:>2} {:>3} {:>4} {:>9} {:>9} {:>9} {:>10} {:>9}  ", wave.mode, wave.k, wave.harmonic,
                        figure(1e-9 * wave.frequency), figure(wave.synchronous_voltage.value),
                        figure(1e3 * wave.synchronous_field.value), figure(threshold), over);
        append_wrapped(lines, head, nonrelativistic_text(wave));
    }
    append_wrapped(lines, "  ",
                   "above it: the anode voltage over the threshold. Harmonics with m < 0 turn against their mode's own "
                   "wave; the electrons meet them in the wave that turns the other way.");
    if (out_of_step) append_wrapped(lines, "  ", "- : B is not above B0, no electron keeps step with the wave.");
}

Json row_json(const ChartRow& row) {
    return {{"value", number(row.value)},
            {"unit", row.unit},
            {"nonrelativistic", number(row.nonrelativistic)},
            {"note", row.note},
            {"source", row.source > 0 ? Json(chart_sources().at(static_cast<std::size_t>(row.source - 1))) : Json()}};
}

Json wave_json(const ChartWave& wave) {
    const auto other = [](const ChartValue& value, double scale) {
        return number(scale * nonrelativistic_worth_showing(value));
    };
    return {{"mode", wave.mode},
            {"k", wave.k},
            {"harmonic", wave.harmonic},
            {"frequency_GHz", 1e-9 * wave.frequency},
            {"v0_V", number(wave.synchronous_voltage.value)},
            {"v0_nonrelativistic_V", other(wave.synchronous_voltage, 1)},
            {"b0_mT", number(1e3 * wave.synchronous_field.value)},
            {"b0_nonrelativistic_mT", other(wave.synchronous_field, 1e3)},
            {"hartree_voltage_V", number(wave.hartree_voltage.value)},
            {"hartree_voltage_nonrelativistic_V", other(wave.hartree_voltage, 1)}};
}

}  // namespace

std::vector<std::string> chart_lines(const Chart& chart) {
    std::vector<std::string> lines;
    append_wrapped(lines, "", fmt::format("Operating chart of {} ({})", chart.tube_name, chart.deck_path));
    const char* section = "";
    for (const ChartRow& row : chart_rows(chart)) {
        if (std::string_view(section) != row.section) {
            lines.push_back("");
            lines.push_back(lines.size() == 2 ? fmt::format("{:<34}{:>10} {:>10}", row.section, "value", "non-rel.")
                                              : row.section);
            section = row.section;
        }
        append_row(lines, row);
    }
    lines.push_back("");
    append_waves(lines, chart);
    lines.push_back("");
    lines.push_back("Sources. Values are relativistic; non-rel. stands where it differs by over 0.1 %.");
    for (std::size_t k = 0; k < chart_sources().size(); ++k) {
        append_wrapped(lines, fmt::format("  [{}] ", k + 1), chart_sources()[k]);
    }
    append_wrapped(lines, "", kSafetyNote);
    return lines;
}

Json chart_json(const Chart& chart) {
    Json rows = Json::object();
    for (const ChartRow& row : chart_rows(chart)) rows[row.key] = row_json(row);
    Json waves = Json::array();
    for (const ChartWave& wave : chart.waves) waves.push_back(wave_json(wave));
    return {{"program", "spokewright"},
            {"tube", chart.tube_name},
            {"deck", chart.deck_path},
            {"deck_sha256", chart.deck_sha256},
            {"rows", rows},
            {"waves", waves},
            {"safety", kSafetyNote}};
}

std::string chart_json_text(const Chart& chart) {
    return chart_json(chart).dump(2, ' ', false, Json::error_handler_t::replace) + "\n";
}

}  // namespace spokewright
