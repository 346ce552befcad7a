// SPDX-License-Identifier: MIT
#include "fields/poisson.hpp"

#include <algorithm>
#include <cmath>

#include "inputs/constants.hpp"

namespace spokewright {
namespace {

double* doubles(Poisson::Harmonics& values) {
    return reinterpret_cast<double*>(values.data());
}

}  // namespace

Poisson::Poisson(const PolarGrid& grid)
    : grid_(grid),
      fourier_(grid.n_r + 1, grid.n_theta),
      width_(2 * static_cast<std::size_t>(fourier_.harmonics())),
      conductance_(static_cast<std::size_t>(grid.n_r)),
      pivot_(static_cast<std::size_t>(grid.n_r + 1) * width_, 0.0),
      laplace_(pivot_.size(), 0.0),
      charge_(static_cast<std::size_t>(grid.n_r + 1) * static_cast<std::size_t>(fourier_.harmonics())),
      wall_charge_(static_cast<std::size_t>(fourier_.harmonics())) {
    for (int i = 0; i < grid.n_r; ++i) {
        conductance_[static_cast<std::size_t>(i)] = 1 / std::log(grid.radius(i + 1) / grid.radius(i));
    }
    const auto n_r = static_cast<std::size_t>(grid.n_r);
    for (std::size_t lane = 0; lane < width_; ++lane) {
        const double sine = std::sin(0.5 * static_cast<double>(lane / 2) * grid.dtheta());
        const double eigenvalue = 4 * sine * sine / (grid.dtheta() * grid.dtheta());
        // Thomas elimination: pivot_i = 1 / (d_i - g_{i-1}^2 pivot_{i-1}), the same for every right-hand side.
        double previous = 0;
        for (std::size_t i = 1; i < n_r; ++i) {
            const double radius = grid.radius(static_cast<int>(i));
            const double arc = std::log((radius + 0.5 * grid.dr()) / (radius - 0.5 * grid.dr()));  // integral of dr / r
            const double diagonal = conductance_[i - 1] + conductance_[i] + arc * eigenvalue;
            previous = 1 / (diagonal - conductance_[i - 1] * conductance_[i - 1] * previous);
            pivot_[i * width_ + lane] = previous;
        }
        laplace_[n_r * width_ + lane] = 1;
        for (std::size_t i = n_r - 1; i >= 1; --i) {
            laplace_[i * width_ + lane] =
                conductance_[i] * pivot_[i * width_ + lane] * laplace_[(i + 1) * width_ + lane];
        }
    }
}

void Poisson::transform(std::span<const double> node_charge) {
    fourier_.forward(node_charge, charge_);
    double* sum = doubles(wall_charge_);
    std::fill(sum, sum + width_, 0.0);
    const double* row = doubles(charge_);
    const double* weight = laplace_.data();
    for (int i = 0; i <= grid_.n_r; ++i, row += width_, weight += width_) {
        for (std::size_t lane = 0; lane < width_; ++lane) {
            sum[lane] += row[lane] * weight[lane];
        }
    }
}

void Poisson::solve(std::span<const std::complex<double>> wall, std::span<double> potential) {
    const auto n_r = static_cast<std::size_t>(grid_.n_r);
    // Node charge to flux a radian, and the 1/n_theta of the inverse transform.
    const double scale = 1 / (kVacuumPermittivity * grid_.axial_height * grid_.dtheta() * grid_.n_theta);
    double* rows = doubles(charge_);
    std::fill(rows, rows + width_, 0.0);
    for (std::size_t i = 1; i < n_r; ++i) {
        const double g = conductance_[i - 1];
        const double* inner = rows + (i - 1) * width_;
        const double* pivot = pivot_.data() + i * width_;
        double* row = rows + i * width_;
        for (std::size_t lane = 0; lane < width_; ++lane) {
            row[lane] = (row[lane] * scale + g * inner[lane]) * pivot[lane];
        }
    }
    const double inverse_length = 1.0 / grid_.n_theta;
    for (std::size_t m = 0; m < wall_charge_.size(); ++m) {
        charge_[n_r * wall_charge_.size() + m] = wall[m] * inverse_length;
    }
    for (std::size_t i = n_r - 1; i >= 1; --i) {
        const double g = conductance_[i];
        const double* outer = rows + (i + 1) * width_;
        const double* pivot = pivot_.data() + i * width_;
        double* row = rows + i * width_;
        for (std::size_t lane = 0; lane < width_; ++lane) {
            row[lane] += g * pivot[lane] * outer[lane];
        }
    }
    fourier_.backward(charge_, potential);
}

Poisson::Harmonics Poisson::wall_harmonics(std::span<const double> values) {
    const RowFourier fourier(1, static_cast<int>(values.size()));
    const AlignedVector<double> row(values.begin(), values.end());
    Harmonics harmonics(static_cast<std::size_t>(fourier.harmonics()));
    fourier.forward(row, harmonics);
    return harmonics;
}

double Poisson::row_product(std::span<const std::complex<double>> a, std::span<const std::complex<double>> b) const {
    // Parseval; every harmonic but 0 and the Nyquist one stands for itself and its conjugate.
    double sum = 0;
    for (std::size_t m = 0; m < a.size(); ++m) {
        const bool single = m == 0 || 2 * m == static_cast<std::size_t>(grid_.n_theta);
        sum += (single ? 1 : 2) * (a[m].real() * b[m].real() + a[m].imag() * b[m].imag());
    }
    return sum / grid_.n_theta;
}

double Poisson::laplace_weight(int row, int harmonic) const {
    return laplace_[static_cast<std::size_t>(row) * width_ + 2 * static_cast<std::size_t>(harmonic)];
}

}  // namespace spokewright
