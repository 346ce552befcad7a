// SPDX-License-Identifier: MIT
// Sources: the definition of the discrete Fourier transform, as a direct sum; F. J. Harris, Proc. IEEE 66, 51 (1978)
// (Hann window: half the height one bin beside a line, 1.42 dB lost half a bin beside it; from memory).
#include <doctest/doctest.h>

#include <cmath>
#include <complex>
#include <stdexcept>
#include <utility>

#include "fields/aligned.hpp"
#include "fields/fourier.hpp"
#include "inputs/constants.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

using Row = AlignedVector<double>;
using Spectrum = AlignedVector<std::complex<double>>;
constexpr double kRounding = 1e-12;  // sums of at most 160 terms of order 10
constexpr int kRows = 3;

/// Values that tell row from column: no two rows, and no two places in a row, are alike.
double value(int row, int place) {
    return 1 + 3 * row + std::sin(1.7 * place + 0.3 * place * row);
}

Row indexed_values(int length) {
    Row values;
    for (int row = 0; row < kRows; ++row) {
        for (int j = 0; j < length; ++j) values.push_back(value(row, j));
    }
    return values;
}

std::complex<double> direct_sum(int row, int harmonic, int length) {
    std::complex<double> sum = 0;
    for (int j = 0; j < length; ++j) sum += value(row, j) * std::polar(1.0, -2 * kPi * harmonic * j / length);
    return sum;
}

Row sine(int length, double bin, double amplitude, double phase) {
    Row record;
    for (int k = 0; k < length; ++k) record.push_back(amplitude * std::cos(2 * kPi * bin * k / length + phase));
    return record;
}

}  // namespace

TEST_CASE("forward is the direct sum, row by row, for odd, even and tiny lengths") {
    for (const int length : {1, 2, 3, 7, 12, 45, 160}) {
        const RowFourier fourier(kRows, length);
        CHECK(fourier.rows() == kRows);
        CHECK(fourier.length() == length);
        CHECK(fourier.harmonics() == length / 2 + 1);
        const Row values = indexed_values(length);
        Spectrum spectrum(static_cast<std::size_t>(kRows * fourier.harmonics()));
        fourier.forward(values, spectrum);
        double worst = 0;
        for (int row = 0; row < kRows; ++row) {
            for (int m = 0; m < fourier.harmonics(); ++m) {
                const auto found = spectrum[static_cast<std::size_t>(row * fourier.harmonics() + m)];
                worst = std::fmax(worst, std::abs(found - direct_sum(row, m, length)));
                CHECK(std::isfinite(std::abs(found)));
            }
        }
        CHECK(worst < kRounding * length);
        CHECK(values == indexed_values(length));  // the input is left alone
    }
}

TEST_CASE("backward after forward gives the values times the length") {
    for (const int length : {1, 2, 3, 7, 12, 45, 160}) {
        const RowFourier fourier(kRows, length);
        const Row values = indexed_values(length);
        Spectrum spectrum(static_cast<std::size_t>(kRows * fourier.harmonics()));
        Row back(values.size());
        fourier.forward(values, spectrum);
        fourier.backward(spectrum, back);
        for (std::size_t k = 0; k < back.size(); ++k) {
            CHECK(std::abs(back[k] / length - values[k]) < 10 * kRounding);  // of values up to 8
        }
    }
}

TEST_CASE("a moved transform still works") {
    RowFourier first(1, 8);
    const RowFourier second(std::move(first));
    Row values(8, 2.0);
    Spectrum spectrum(5);
    second.forward(values, spectrum);
    CHECK(spectrum[0] == std::complex<double>(16, 0));
}

TEST_CASE("arrays that are not aligned are refused on either side") {
    const RowFourier fourier(1, 8);
    Row values(9), shifted_storage(11);
    Spectrum spectrum(5);
    const std::span<double> shifted = std::span(values).subspan(1);
    // Five complex numbers that begin 8 bytes beyond a 64-byte line.
    const std::span<std::complex<double>> odd(reinterpret_cast<std::complex<double>*>(shifted_storage.data() + 1), 5);
    CHECK_THROWS_AS(fourier.forward(shifted, spectrum), std::invalid_argument);
    CHECK_THROWS_AS(fourier.forward(values, odd), std::invalid_argument);
    CHECK_THROWS_AS(fourier.backward(spectrum, shifted), std::invalid_argument);
    CHECK_THROWS_AS(fourier.backward(odd, values), std::invalid_argument);
    CHECK_NOTHROW(fourier.forward(values, spectrum));
}

TEST_CASE("a size without a transform is refused") {
    CHECK_THROWS_AS(RowFourier(1, 0), std::invalid_argument);
}

TEST_CASE("a sine in the middle of a bin reads its amplitude there, half of it beside, nothing elsewhere") {
    for (const int length : {64, 77}) {
        for (const double phase : {0.0, 0.4, kPi / 2}) {
            const auto amplitude = amplitude_spectrum(sine(length, 9, 250, phase));
            REQUIRE(amplitude.size() == static_cast<std::size_t>(length / 2 + 1));
            for (std::size_t k = 0; k < amplitude.size(); ++k) {
                const double share = k == 9 ? 1 : k == 8 || k == 10 ? 0.5 : 0;
                CHECK(std::abs(amplitude[k] - 250 * share) < 250 * kRounding);
                CHECK(std::isfinite(amplitude[k]));
            }
        }
    }
}

TEST_CASE("a sine between two bins reads 1.42 dB low in both") {
    const auto amplitude = amplitude_spectrum(sine(1000, 100.5, 1, 0.3));
    // 8 / (3 pi) for a long record; the line's mirror at -100.5 adds some 1e-6.
    CHECK(relative_error(amplitude[100], 8 / (3 * kPi)) < 1e-5);
    CHECK(relative_error(amplitude[101], 8 / (3 * kPi)) < 1e-5);
    CHECK(std::abs(20 * std::log10(amplitude[100]) + 1.42) < 0.005);  // as printed
}

TEST_CASE("short records: none from fewer than two samples, finite from two and three") {
    CHECK(amplitude_spectrum({}).empty());
    CHECK(amplitude_spectrum(Row{5}).empty());
    for (const Row& record : {Row{3, -4}, Row{1, 2, 3}}) {
        const auto amplitude = amplitude_spectrum(record);
        CHECK(amplitude.size() == 2);
        for (const double a : amplitude) CHECK(std::isfinite(a));
    }
    // Two samples: the window is 0 and 1, so all that is seen is the second.
    CHECK(relative_error(amplitude_spectrum(Row{3, -4})[1], 8) < kRounding);
}
