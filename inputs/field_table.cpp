// SPDX-License-Identifier: MIT
#include "inputs/field_table.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "inputs/deck_values.hpp"
#include "inputs/errors.hpp"
#include "inputs/text_file.hpp"

namespace spokewright {

namespace {

constexpr Unit kMillimetre{"mm", 1e-3};
constexpr Unit kTesla{"T", 1};
constexpr Range kRadii = between(0, 10000);  // wide: a table may reach far outside the tube
constexpr Range kFields = between(0, 10);    // the model's field points along +z

FieldSample read_row(std::string_view row) {
    const std::vector<std::string_view> items = list_items(row);
    if (items.size() != 2) {
        throw BadValue(fmt::format("{} columns; allowed: two, the radius in mm and the field in T", items.size()));
    }
    return {read_real(items[0], kRadii, kMillimetre) * kMillimetre.to_si, read_real(items[1], kFields, kTesla)};
}

}  // namespace

std::vector<FieldSample> read_field_table(const std::string& path, double cathode_radius, double anode_radius) {
    const std::string text = read_text_file(path);
    std::vector<FieldSample> table;
    std::size_t line_number = 0;
    std::size_t last_row = 0;  // the lines of the first and last row, for the message on the cover
    std::size_t first_row = 0;
    for (const std::string_view line : split_lines(text)) {
        ++line_number;
        const std::string_view row = strip_comment(line);
        if (row.empty()) continue;
        try {
            const FieldSample sample = read_row(row);
            if (!table.empty() && sample.radius <= table.back().radius) {
                throw BadValue("the radius does not rise; allowed: radii that rise from row to row");
            }
            if (table.empty()) first_row = line_number;
            last_row = line_number;
            table.push_back(sample);
        } catch (const BadValue& fault) {
            throw InputError(fmt::format("{}:{}: {}", path, line_number, fault.what()));
        }
    }
    if (table.size() < 2) {
        throw InputError(
            fmt::format("{}: {} rows; allowed: two or more of radius in mm and field in T", path, table.size()));
    }
    if (table.front().radius > cathode_radius || table.back().radius < anode_radius) {
        throw InputError(
            fmt::format("{}:{}: covers {:g}..{:g} mm; allowed: a table from cathode to anode, {:g}..{:g} mm", path,
                        table.front().radius > cathode_radius ? first_row : last_row, table.front().radius * 1e3,
                        table.back().radius * 1e3, cathode_radius * 1e3, anode_radius * 1e3));
    }
    return table;
}

double mean_field(const Deck& deck) {
    const std::vector<FieldSample>& table = deck.magnet.table;
    if (table.empty()) return deck.magnet.field * deck.magnet.field_scale;
    const double inner = deck.tube.cathode_radius;
    const double outer = deck.tube.anode_radius;
    double flux = 0;  // per radian, of the part of the table between the electrodes
    for (std::size_t i = 1; i < table.size(); ++i) {
        const double slope = (table[i].field - table[i - 1].field) / (table[i].radius - table[i - 1].radius);
        const double a = std::clamp(table[i - 1].radius, inner, outer);
        const double b = std::clamp(table[i].radius, inner, outer);
        const double field_on_axis = table[i - 1].field - slope * table[i - 1].radius;
        flux += field_on_axis * (b * b - a * a) / 2 + slope * (b * b * b - a * a * a) / 3;
    }
    return deck.magnet.field_scale * flux / ((outer * outer - inner * inner) / 2);
}

}  // namespace spokewright
