// SPDX-License-Identifier: MIT
// Poisson's equation -eps0 div(grad phi) = rho between a cathode at 0 V and a wall whose potential varies with theta.
// Finite volumes on the polar grid (second order), FFT over theta and one tridiagonal system in r a harmonic
// (R. W. Hockney, J. ACM 12, 95 (1965)). The radial fluxes use ln(r_{i+1}/r_i), exact for a coaxial vacuum.
#pragma once

#include <complex>
#include <span>
#include <vector>

#include "fields/aligned.hpp"
#include "fields/fourier.hpp"
#include "fields/polar_grid.hpp"

namespace spokewright {

/// Use in order: transform, then any of the readers, then solve. Nothing is allocated after construction.
class Poisson {
public:
    using Harmonics = AlignedVector<std::complex<double>>;

    explicit Poisson(const PolarGrid& grid);

    int harmonics() const { return fourier_.harmonics(); }

    /// Takes the node charges, C, [n_r + 1][n_theta].
    void transform(std::span<const double> node_charge);

    /// Harmonics over theta, unnormalised, of the sum over rows of charge times Laplace weight (1 on the wall, 0 on the
    /// cathode): minus the charge that the charge transformed last induces on the wall (Shockley-Ramo). [harmonics]
    std::span<const std::complex<double>> wall_charge() const { return wall_charge_; }

    /// Solves for the charge transformed last. `wall`: harmonics, unnormalised, of phi(r_a, theta) in V, [harmonics].
    /// `potential`: V, [n_r + 1][n_theta], AlignedVector storage.
    void solve(std::span<const std::complex<double>> wall, std::span<double> potential);

    /// Harmonics of one row of wall values, [n_theta] -> [harmonics]. Allocates; for set-up.
    static Harmonics wall_harmonics(std::span<const double> values);

    /// Sum over theta of a(theta) b(theta) for two real rows given by their unnormalised harmonics.
    double row_product(std::span<const std::complex<double>> a, std::span<const std::complex<double>> b) const;

    /// Radial Laplace solution of one harmonic at row i, 0 on the cathode and 1 on the wall.
    double laplace_weight(int row, int harmonic) const;

    /// 1 / ln(r_{i+1} / r_i): radial conductance between rows i and i + 1.
    double conductance(int i) const { return conductance_[static_cast<std::size_t>(i)]; }

private:
    PolarGrid grid_;
    RowFourier fourier_;
    std::size_t width_;                // doubles in a row of harmonics
    std::vector<double> conductance_;  // [n_r]
    AlignedVector<double> pivot_;      // [n_r + 1][width_], each harmonic twice: real and imaginary part
    AlignedVector<double> laplace_;    // [n_r + 1][width_]
    Harmonics charge_;                 // [n_r + 1][harmonics]
    Harmonics wall_charge_;            // [harmonics]
};

}  // namespace spokewright
