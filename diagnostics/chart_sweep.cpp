// SPDX-License-Identifier: MIT
#include "diagnostics/chart_sweep.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <string_view>

#include "diagnostics/chart_rows.hpp"
#include "inputs/deck_keys.hpp"
#include "inputs/deck_reader.hpp"
#include "inputs/deck_values.hpp"
#include "inputs/errors.hpp"
#include "inputs/text_file.hpp"

namespace spokewright {
namespace {

constexpr int kMostSteps = 10'000;
constexpr Range kAnyNumber = between(-1e12, 1e12);  // the deck's own ranges decide

/// Ten figures, so that 0.1 + 0.2 is 0.3.
std::string value_text(double value) {
    return fmt::format("{:.10g}", value);
}

Chart chart_at(const std::string& deck_path, std::vector<std::string> overrides, const std::string& setting) {
    overrides.push_back(setting);
    try {
        return operating_chart(read_deck(deck_path, overrides));
    } catch (const InputError& error) {
        const std::string_view fault = error.what();
        const std::string place = "--set " + setting;
        if (!fault.starts_with(place)) throw;
        throw InputError(fmt::format("--sweep {}{}", setting, fault.substr(place.size())));
    }
}

}  // namespace

double ChartSweep::value(int step) const {
    return step == steps ? to : from + (to - from) * step / steps;
}

ChartSweep read_chart_sweep(const std::string& text) {
    const std::string place = "--sweep " + escaped(text);
    const std::size_t equals = text.find('=');
    const std::size_t first = text.find(':', std::min(equals, text.size()));
    const std::size_t second = first == std::string::npos ? first : text.find(':', first + 1);
    if (equals == std::string::npos || equals == 0 || second == std::string::npos) {
        throw InputError(place + ": not a sweep; allowed: section.key=from:to:steps");
    }
    const std::string key = text.substr(0, equals);
    const std::size_t dot = std::min(key.find('.'), key.size());
    const auto known = std::ranges::find(deck_keys(), key, &DeckKey::full_name);
    if (known == deck_keys().end()) {
        throw InputError(fmt::format("{}: {}: unknown key; the nearest known key is {}", place, escaped(key),
                                     nearest_key(key.substr(0, dot), key.substr(std::min(dot + 1, key.size())))));
    }
    if (known->value.range.starts_with("text") || known->value.range.starts_with("a file")) {
        throw InputError(fmt::format("{}: {} takes no number; allowed: a key with a number", place, key));
    }
    try {
        const std::string_view values = text;
        ChartSweep sweep{key, read_real(values.substr(equals + 1, first - equals - 1), kAnyNumber, kNoUnit),
                         read_real(values.substr(first + 1, second - first - 1), kAnyNumber, kNoUnit),
                         static_cast<int>(read_integer(values.substr(second + 1), 1, kMostSteps))};
        if (sweep.from == sweep.to) throw BadValue("goes nowhere; allowed: two different ends");
        return sweep;
    } catch (const BadValue& fault) {
        throw InputError(fmt::format("{}: {}", place, fault.what()));
    }
}

std::string chart_csv(const std::string& deck_path, const std::vector<std::string>& overrides,
                      const ChartSweep& sweep) {
    std::string header = sweep.key;
    std::string lines;
    for (int step = 0; step <= sweep.steps; ++step) {
        const std::string value = value_text(sweep.value(step));
        lines += value;
        for (const ChartRow& row : chart_rows(chart_at(deck_path, overrides, sweep.key + "=" + value))) {
            if (!row.in_sweep) continue;
            if (step == 0) header += fmt::format(",{}", row.key);
            lines += std::isfinite(row.value) ? fmt::format(",{}", row.value) : ",";
        }
        lines += '\n';
    }
    return header + '\n' + lines;
}

}  // namespace spokewright
