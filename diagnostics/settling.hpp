// SPDX-License-Identifier: MIT
// When has a run settled, and how sure are its means? Truncation by MSER-5: K. P. White Jr., Simulation 69, 323 (1997).
// Means by non-overlapping batch means with Student's t: A. M. Law, Simulation Modeling and Analysis.
#pragma once

#include <cstddef>
#include <span>
#include <string>

namespace spokewright {

/// A mean and the half-width of its 95 % confidence interval (infinite when the record is too short to say).
struct MeanWithError {
    double mean = 0;
    double half_width = 0;
};

/// Index of the first sample to keep: the cut that minimises the squared standard error of the mean of what remains,
/// over batches of 5. Only cuts inside the first half are tried; `found` is false when the best cut is the last one
/// tried (still falling) or the record is shorter than 20 samples. Of cuts whose squared standard errors differ by less
/// than `negligible` squared (in the record's unit) the earliest is taken: the tail of a build-up without noise would
/// otherwise be cut for ever.
struct Truncation {
    std::size_t kept_from = 0;
    bool found = false;
};
Truncation mser5(std::span<const double> record, double negligible = 0);

/// Mean over 20 batches, or 10 when neighbouring batches of 20 still hang together. Left-over samples at the front of
/// the span are dropped. NaN entries are an error of the caller and give NaN.
MeanWithError batch_mean(std::span<const double> record);

/// Ratio of two means, with the half-width of the ratio from the batches' residuals (the classical ratio estimate).
/// Spans of one length. NaN mean when the denominator's mean is zero.
MeanWithError batch_ratio(std::span<const double> numerator, std::span<const double> denominator);

/// A half-width beyond this share of the mean leaves a run unsettled. 5 %: the differences between operating points
/// that a chart must show are of that size (common practice, no source).
inline constexpr double kHalfWidthTolerance = 0.05;
/// Drift from the first to the last third of the kept part that is let pass: 2 % of the mean, well inside the above, or
/// three half-widths of what is left without its straight line (2.6 standard errors of that difference for noise
/// alone).
inline constexpr double kDriftTolerance = 0.02;
inline constexpr double kDriftHalfWidths = 3;

/// Standard error, as a share of the mean, that is not worth cutting for: a five-hundredth of the half-width allowed.
inline constexpr double kNegligibleError = 1e-4;

struct Settling {
    bool settled = false;
    std::size_t kept_from = 0;  // first sample of the part to average; the second half of the record when not settled
    std::string reason;         // why not, for the user; empty when settled
};

/// Judges one run. `current` and `mode_energy` are whole columns; `mode_energy` is empty without oscillation.
/// `programme_end`: first sample at the final voltage. `last_event`: first sample after the last change of mode (0 if
/// there was none).
Settling judge_settling(std::span<const double> current, std::span<const double> mode_energy, std::size_t programme_end,
                        std::size_t last_event);

}  // namespace spokewright
