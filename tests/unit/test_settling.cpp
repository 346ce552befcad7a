// SPDX-License-Identifier: MIT
// Sources: K. P. White Jr., Simulation 69, 323 (1997) (MSER-5); A. M. Law, Simulation Modeling and Analysis (batch
// means).
#include <doctest/doctest.h>

#include <cmath>
#include <random>
#include <vector>

#include "diagnostics/settling.hpp"
#include "inputs/constants.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

/// First-order autoregressive noise of unit variance, correlation `phi` a sample, about `mean`; Gaussian by G. E. P.
/// Box & M. E. Muller (1958), so that the numbers do not depend on the library.
std::vector<double> autoregressive(std::size_t length, double mean, double phi, std::uint64_t seed) {
    std::mt19937_64 engine(seed);
    const auto uniform = [&] { return (static_cast<double>(engine() >> 11) + 0.5) * 0x1p-53; };
    const auto normal = [&] { return std::sqrt(-2 * std::log(uniform())) * std::cos(2 * kPi * uniform()); };
    std::vector<double> record(length);
    double noise = normal();
    for (double& value : record) {
        value = mean + noise;
        noise = phi * noise + std::sqrt(1 - phi * phi) * normal();
    }
    return record;
}

void add_transient(std::vector<double>& record, double height, double decay) {
    for (std::size_t k = 0; k < record.size(); ++k) record[k] += height * std::exp(-static_cast<double>(k) / decay);
}

}  // namespace

TEST_CASE("MSER-5 cuts off a transient and little more") {
    std::vector<double> record = autoregressive(4000, 100, 0.8, 1);
    add_transient(record, 50, 100);
    const Truncation cut = mser5(record);
    CHECK(cut.found);
    // After 2 decay times 7 of 50 units are left, seven standard deviations of the noise; after 8 nothing.
    CHECK(cut.kept_from > 200);
    CHECK(cut.kept_from < 1000);
    CHECK(cut.kept_from % 5 == 0);
}

TEST_CASE("MSER-5 by its definition, on a record short enough to try every cut by hand") {
    const std::vector<double> record = autoregressive(60, 0, 0.5, 7);
    double least = INFINITY;
    std::size_t best = 0;
    for (std::size_t cut = 0; cut <= 6; ++cut) {
        std::vector<double> kept;
        for (std::size_t b = cut; b < 12; ++b) {
            double sum = 0;
            for (std::size_t k = 0; k < 5; ++k) sum += record[5 * b + k];
            kept.push_back(sum / 5);
        }
        double mean = 0;
        for (const double value : kept) mean += value / static_cast<double>(kept.size());
        double squares = 0;
        for (const double value : kept) squares += (value - mean) * (value - mean);
        const double statistic = squares / std::pow(static_cast<double>(kept.size()), 2);
        if (statistic < least) {
            least = statistic;
            best = cut;
        }
    }
    const Truncation cut = mser5(record);
    CHECK(cut.kept_from == 5 * best);
    CHECK(cut.found == (best < 6));
}

TEST_CASE("MSER-5 keeps all of a constant record, finds nothing in a short one or a ramp") {
    CHECK(mser5(std::vector<double>(100, 3.0)).kept_from == 0);
    CHECK(mser5(std::vector<double>(100, 3.0)).found);
    CHECK_FALSE(mser5(std::vector<double>(19, 3.0)).found);
    std::vector<double> ramp(1000);
    for (std::size_t k = 0; k < ramp.size(); ++k) ramp[k] = static_cast<double>(k);
    CHECK_FALSE(mser5(ramp).found);
}

TEST_CASE("the tail of a build-up without noise is not cut for ever") {
    std::vector<double> record(2000, 10.0);
    add_transient(record, -10, 50);
    CHECK_FALSE(mser5(record).found);  // every cut still gains something
    const Truncation cut = mser5(record, 1e-3);
    CHECK(cut.found);
    CHECK(cut.kept_from > 100);
    CHECK(judge_settling(record, {}, 0, 0).settled);
}

TEST_CASE("the 95 % interval covers the true mean about 95 times in a hundred") {
    int covered = 0;
    constexpr int kRuns = 400;
    for (int run = 0; run < kRuns; ++run) {
        const MeanWithError estimate = batch_mean(autoregressive(2000, 5, 0.8, 100 + static_cast<std::uint64_t>(run)));
        covered += std::abs(estimate.mean - 5) <= estimate.half_width ? 1 : 0;
    }
    // Binomial standard deviation 1.1 %; 4 sigma either way.
    CHECK(covered > kRuns * (0.95 - 4 * 0.011));
    CHECK(covered < kRuns * (0.95 + 4 * 0.011));
}

TEST_CASE("batch means by hand: twenty batches, Student's t of 19 degrees") {
    std::vector<double> record;
    for (int b = 0; b < 20; ++b) {
        for (int k = 0; k < 4; ++k) record.push_back(b % 2 == 0 ? 1 : 3);  // batch means 1, 3, 1, 3, ...
    }
    const MeanWithError estimate = batch_mean(record);
    CHECK(relative_error(estimate.mean, 2) < 1e-12);
    // Standard table of Student's t: 2.093; variance 20 / 19.
    CHECK(relative_error(estimate.half_width, 2.093 * std::sqrt(20.0 / 19 / 20)) < 1e-4);
    CHECK(std::isnan(batch_mean({}).mean));
    CHECK(std::isinf(batch_mean(std::vector<double>(10, 1.0)).half_width));
}

TEST_CASE("a ratio of quantities that move together is surer than either") {
    const std::vector<double> input = autoregressive(2000, 20, 0.9, 3);
    std::vector<double> output = input;
    for (double& value : output) value *= 0.7;
    const MeanWithError ratio = batch_ratio(output, input);
    CHECK(relative_error(ratio.mean, 0.7) < 1e-12);
    CHECK(ratio.half_width < 1e-12);
    CHECK(std::isnan(batch_ratio(input, std::vector<double>(2000, 0.0)).mean));
}

TEST_CASE("a run with a transient settles, with means free of it") {
    std::vector<double> current = autoregressive(4000, 10, 0.8, 11);
    std::vector<double> energy = autoregressive(4000, 50, 0.8, 12);
    add_transient(current, -10, 100);
    add_transient(energy, -50, 150);
    const Settling settling = judge_settling(current, energy, 200, 0);
    CHECK(settling.settled);
    CHECK(settling.reason == "");
    CHECK(settling.kept_from > 300);
    const MeanWithError mean = batch_mean(std::span(current).subspan(settling.kept_from));
    CHECK(std::abs(mean.mean - 10) < 2 * mean.half_width);  // 4 sigma
}

TEST_CASE("what does not settle says why and what to do") {
    const std::vector<double> steady = autoregressive(4000, 10, 0.8, 21);
    std::vector<double> ramp = steady;
    for (std::size_t k = 0; k < ramp.size(); ++k) ramp[k] += 5 * static_cast<double>(k) / 4000;
    CHECK_FALSE(judge_settling(ramp, {}, 0, 0).settled);
    CHECK_FALSE(judge_settling(ramp, {}, 0, 0).reason.empty());
    CHECK_FALSE(judge_settling(steady, ramp, 0, 0).settled);
    CHECK(judge_settling(steady, {}, 0, 0).settled);

    CHECK(judge_settling(steady, {}, 4000, 0).reason ==
          "the supply has not reached its final voltage: lengthen clock.end_time_ns");
    CHECK(judge_settling(steady, {}, 3990, 0).reason ==
          "only 10 samples at the final voltage (at least 80): lengthen clock.end_time_ns or lower clock.sample_every");
    CHECK(judge_settling(steady, {}, 0, 3000).reason ==
          "the mode changed in the second half: lengthen clock.end_time_ns");
    CHECK(judge_settling(steady, {}, 0, 1500).kept_from == 1500);  // an early change only moves the start
    const std::vector<double> noisy = autoregressive(4000, 0.2, 0.95, 22);
    CHECK(judge_settling(noisy, {}, 0, 0).reason.starts_with("the mean anode current is uncertain by"));
}
