// SPDX-License-Identifier: MIT
// FFTW's one home. Plans are made in constructors (FFTW_ESTIMATE: the same plan, hence the same rounding, every run).
// M. Frigo & S. G. Johnson, Proc. IEEE 93, 216 (2005).
#pragma once

#include <complex>
#include <memory>
#include <span>
#include <vector>

namespace spokewright {

/// Real transforms of `rows` contiguous rows of length `length`; harmonics 0..length/2 a row, unnormalised.
class RowFourier {
public:
    RowFourier(int rows, int length);
    ~RowFourier();
    RowFourier(RowFourier&&) noexcept;
    RowFourier& operator=(RowFourier&&) noexcept;

    int rows() const { return rows_; }
    int length() const { return length_; }
    int harmonics() const { return length_ / 2 + 1; }

    /// [rows][length] real -> [rows][harmonics], sum_j x_j exp(-2 pi i m j / length).
    void forward(std::span<const double> values, std::span<std::complex<double>> harmonics) const;
    /// Inverse without the factor 1/length. Destroys `harmonics`.
    void backward(std::span<std::complex<double>> harmonics, std::span<double> values) const;

private:
    struct Plans;
    int rows_;
    int length_;
    std::unique_ptr<Plans> plans_;
};

/// One-sided amplitude spectrum of a real record: a Hann window, scaled so that a sine of amplitude A in the middle of
/// a bin reads A (a constant, and the last bin, read double). Length n gives n/2 + 1 values; bin k is the frequency k /
/// (n dt).
std::vector<double> amplitude_spectrum(std::span<const double> record);

}  // namespace spokewright
