// SPDX-License-Identifier: MIT
#include "diagnostics/settling.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <numeric>
#include <vector>

namespace spokewright {
namespace {

constexpr double kStudent19 = 2.093024;  // 97.5 % points of Student's t for 19 and 9 degrees of freedom (tables)
constexpr double kStudent9 = 2.262157;
constexpr double kLooseBatches = 0.4;      // lag-1 correlation, 1.8 standard errors for 20 independent batches
constexpr std::size_t kLeastSamples = 40;  // two a batch

double mean_of(std::span<const double> values) {
    return std::accumulate(values.begin(), values.end(), 0.0) / static_cast<double>(values.size());
}

/// Means of `count` equal batches; what does not fill them is dropped at the front.
std::vector<double> batches(std::span<const double> record, std::size_t count) {
    const std::size_t length = record.size() / count;
    const auto tail = record.last(length * count);
    std::vector<double> means(count);
    for (std::size_t b = 0; b < count; ++b) means[b] = mean_of(tail.subspan(b * length, length));
    return means;
}

double square_sum(std::span<const double> values, double centre) {
    double sum = 0;
    for (const double value : values) sum += (value - centre) * (value - centre);
    return sum;
}

double lag_one_correlation(std::span<const double> values) {
    const double centre = mean_of(values);
    const double scale = square_sum(values, centre);
    double product = 0;
    for (std::size_t i = 1; i < values.size(); ++i) product += (values[i] - centre) * (values[i - 1] - centre);
    return scale > 0 ? product / scale : 0;
}

/// Half-width of the mean of batch values about `centre`.
double half_width(std::span<const double> means, double centre) {
    const double count = static_cast<double>(means.size());
    const double student = means.size() == 20 ? kStudent19 : kStudent9;
    return student * std::sqrt(square_sum(means, centre) / (count - 1) / count);
}

/// The record less its least-squares line: the noise against which a drift is weighed.
std::vector<double> without_line(std::span<const double> record) {
    const double centre = mean_of(record);
    const double middle = 0.5 * static_cast<double>(record.size() - 1);
    double product = 0;
    double squares = 0;
    for (std::size_t k = 0; k < record.size(); ++k) {
        const double x = static_cast<double>(k) - middle;
        product += x * record[k];
        squares += x * x;
    }
    std::vector<double> rest(record.begin(), record.end());
    for (std::size_t k = 0; k < rest.size(); ++k) {
        rest[k] -= centre + product / squares * (static_cast<double>(k) - middle);
    }
    return rest;
}

struct Trial {
    bool passed;
    std::string reason;
};

/// Half-width and drift of one quantity over the part that is kept.
Trial steady(std::span<const double> kept, const char* name) {
    const MeanWithError estimate = batch_mean(kept);
    const double scale = std::abs(estimate.mean);
    if (!(estimate.half_width <= kHalfWidthTolerance * scale)) {
        return {false,
                fmt::format("the mean {} is uncertain by {:.1f} % (allowed {:.0f} %): lengthen clock.end_time_ns", name,
                            100 * estimate.half_width / scale, 100 * kHalfWidthTolerance)};
    }
    const std::size_t third = kept.size() / 3;
    const double drift = std::abs(mean_of(kept.last(third)) - mean_of(kept.first(third)));
    if (!(drift <= std::max(kDriftTolerance * scale, kDriftHalfWidths * batch_mean(without_line(kept)).half_width))) {
        return {false,
                fmt::format("the {} still drifts, by {:.1f} % from the first to the last third of the part kept: "
                            "lengthen clock.end_time_ns",
                            name, 100 * drift / scale)};
    }
    return {true, ""};
}

}  // namespace

Truncation mser5(std::span<const double> record, double negligible) {
    constexpr std::size_t kBatch = 5;
    const std::size_t count = record.size() / kBatch;
    if (count < 4) return {0, false};
    const std::vector<double> means = batches(record, count);
    const double centre = mean_of(means);  // sums about it lose no digits
    double sum = 0;
    double squares = 0;
    const std::size_t last_cut = count / 2;
    std::vector<double> statistic(last_cut + 1);
    for (std::size_t cut = count; cut-- > 0;) {
        const double value = means[cut] - centre;
        sum += value;
        squares += value * value;
        const double kept = static_cast<double>(count - cut);
        if (cut <= last_cut) statistic[cut] = (squares - sum * sum / kept) / (kept * kept);
    }
    const double least = *std::min_element(statistic.begin(), statistic.end()) + negligible * negligible;
    const auto first = std::find_if(statistic.begin(), statistic.end(), [&](double value) { return value <= least; });
    const auto best = static_cast<std::size_t>(first - statistic.begin());
    const std::size_t dropped_in_front = record.size() - count * kBatch;
    return {best == 0 ? 0 : dropped_in_front + best * kBatch, best < last_cut};
}

MeanWithError batch_mean(std::span<const double> record) {
    if (record.empty()) return {std::numeric_limits<double>::quiet_NaN(), std::numeric_limits<double>::infinity()};
    if (record.size() < kLeastSamples) return {mean_of(record), std::numeric_limits<double>::infinity()};
    std::vector<double> means = batches(record, 20);
    if (lag_one_correlation(means) > kLooseBatches) means = batches(record, 10);
    const double mean = mean_of(means);
    return {mean, half_width(means, mean)};
}

MeanWithError batch_ratio(std::span<const double> numerator, std::span<const double> denominator) {
    if (numerator.empty()) return {std::numeric_limits<double>::quiet_NaN(), std::numeric_limits<double>::infinity()};
    const double ratio = mean_of(numerator) / mean_of(denominator);
    if (!std::isfinite(ratio)) {
        return {std::numeric_limits<double>::quiet_NaN(), std::numeric_limits<double>::infinity()};
    }
    std::vector<double> residuals(numerator.size());
    for (std::size_t i = 0; i < residuals.size(); ++i) residuals[i] = numerator[i] - ratio * denominator[i];
    return {ratio, batch_mean(residuals).half_width / std::abs(mean_of(denominator))};
}

Settling judge_settling(std::span<const double> current, std::span<const double> mode_energy, std::size_t programme_end,
                        std::size_t last_event) {
    const std::size_t size = current.size();
    if (programme_end >= size) {
        return {false, size / 2, "the supply has not reached its final voltage: lengthen clock.end_time_ns"};
    }
    const std::size_t tail = size - programme_end;
    const std::size_t middle = programme_end + tail / 2;
    if (tail < 2 * kLeastSamples) {
        return {false, middle,
                fmt::format("only {} samples at the final voltage (at least {}): lengthen "
                            "clock.end_time_ns or lower clock.sample_every",
                            tail, 2 * kLeastSamples)};
    }
    const auto truncate = [&](std::span<const double> column) {
        return mser5(column.subspan(programme_end), kNegligibleError * std::abs(mean_of(column.subspan(middle))));
    };
    Truncation cut = truncate(current);
    if (!mode_energy.empty()) {
        const Truncation other = truncate(mode_energy);
        cut = {std::max(cut.kept_from, other.kept_from), cut.found && other.found};
    }
    const std::size_t kept_from = std::max(programme_end + cut.kept_from, last_event);
    if (!cut.found || kept_from >= middle) {
        return {false, middle,
                last_event >= middle ? "the mode changed in the second half: lengthen clock.end_time_ns"
                                     : "the build-up fills half of the record: lengthen clock.end_time_ns"};
    }
    const Trial by_current = steady(current.subspan(kept_from), "anode current");
    if (!by_current.passed) return {false, middle, by_current.reason};
    if (!mode_energy.empty()) {
        const Trial by_energy = steady(mode_energy.subspan(kept_from), "mode energy");
        if (!by_energy.passed) return {false, middle, by_energy.reason};
    }
    return {true, kept_from, ""};
}

}  // namespace spokewright
