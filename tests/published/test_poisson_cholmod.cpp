// SPDX-License-Identifier: MIT
// Source: Y. Chen, T. A. Davis, W. W. Hager & S. Rajamanickam, ACM Trans. Math. Softw. 35, 22 (2008): CHOLMOD, sparse
// Cholesky, as an independent solver of the same finite-volume equations.
#include <doctest/doctest.h>
#include <suitesparse/cholmod.h>

#include <algorithm>
#include <cmath>
#include <random>
#include <vector>

#include "fields/poisson.hpp"

using namespace spokewright;

namespace {

/// The equations as a matrix over the inner nodes: radial fluxes through ln(r_{i+1} / r_i), azimuthal ones through the
/// integral of dr / r over the cell, charge on the right.
class CholmodPoisson {
public:
    explicit CholmodPoisson(const PolarGrid& grid) : grid_(grid) { cholmod_start(&common_); }
    ~CholmodPoisson() { cholmod_finish(&common_); }
    CholmodPoisson(const CholmodPoisson&) = delete;
    CholmodPoisson& operator=(const CholmodPoisson&) = delete;

    std::vector<double> solve(const std::vector<double>& charge, const std::vector<double>& wall) {
        const auto unknowns = static_cast<std::size_t>((grid_.n_r - 1) * grid_.n_theta);
        entries_ = cholmod_allocate_triplet(unknowns, unknowns, 6 * unknowns, -1, CHOLMOD_REAL, &common_);
        right_ = cholmod_zeros(unknowns, 1, CHOLMOD_REAL, &common_);
        for (int i = 1; i < grid_.n_r; ++i) {
            for (int j = 0; j < grid_.n_theta; ++j) {
                add_node(i, j, charge, wall);
            }
        }
        cholmod_sparse* matrix = cholmod_triplet_to_sparse(entries_, 0, &common_);
        cholmod_factor* factor = cholmod_analyze(matrix, &common_);
        cholmod_factorize(matrix, factor, &common_);
        cholmod_dense* solution = cholmod_solve(CHOLMOD_A, factor, right_, &common_);

        std::vector<double> potential(grid_.nodes(), 0.0);
        const double* inner = static_cast<const double*>(solution->x);
        std::copy(inner, inner + unknowns, potential.begin() + grid_.n_theta);
        std::copy(wall.begin(), wall.end(), potential.end() - grid_.n_theta);
        cholmod_free_dense(&solution, &common_);
        cholmod_free_factor(&factor, &common_);
        cholmod_free_sparse(&matrix, &common_);
        cholmod_free_dense(&right_, &common_);
        cholmod_free_triplet(&entries_, &common_);
        return potential;
    }

private:
    int unknown(int i, int j) const { return (i - 1) * grid_.n_theta + (j + grid_.n_theta) % grid_.n_theta; }

    void add(int row, int column, double value) {
        if (row < column) return;  // the lower triangle is all that CHOLMOD reads
        static_cast<int*>(entries_->i)[entries_->nnz] = row;
        static_cast<int*>(entries_->j)[entries_->nnz] = column;
        static_cast<double*>(entries_->x)[entries_->nnz] = value;
        ++entries_->nnz;
    }

    void add_node(int i, int j, const std::vector<double>& charge, const std::vector<double>& wall) {
        const double radius = grid_.radius(i), dr = grid_.dr(), dtheta = grid_.dtheta();
        const double scale = kVacuumPermittivity * grid_.axial_height;
        const double inward = scale * dtheta / std::log(radius / (radius - dr));
        const double outward = scale * dtheta / std::log((radius + dr) / radius);
        const double around = scale * std::log((radius + dr / 2) / (radius - dr / 2)) / dtheta;
        const int row = unknown(i, j);
        double* right = static_cast<double*>(right_->x);
        right[row] += charge[grid_.node(i, j)];
        add(row, row, inward + outward + 2 * around);
        if (i > 1) add(row, unknown(i - 1, j), -inward);
        if (i + 1 < grid_.n_r) {
            add(row, unknown(i + 1, j), -outward);
        } else {
            right[row] += outward * wall[static_cast<std::size_t>(j)];
        }
        add(row, unknown(i, j - 1), -around);
        add(row, unknown(i, j + 1), -around);
    }

    PolarGrid grid_;
    cholmod_common common_{};
    cholmod_triplet* entries_ = nullptr;
    cholmod_dense* right_ = nullptr;
};

}  // namespace

TEST_CASE("Poisson agrees with sparse Cholesky on the same matrix") {
    std::mt19937 random(7);
    std::uniform_real_distribution<double> uniform(-1, 1);
    struct Size {
        int n_r, n_theta;
    };
    for (const Size size : {Size{2, 5}, Size{7, 24}, Size{48, 160}, Size{33, 45}, Size{120, 64}}) {
        const PolarGrid grid{1.95e-3, 4.45e-3, 9.5e-3, size.n_r, size.n_theta};
        std::vector<double> charge(grid.nodes()), wall(static_cast<std::size_t>(grid.n_theta));
        for (double& q : charge) q = 1e-12 * uniform(random);
        for (double& v : wall) v = 4000 + 1000 * uniform(random);

        Poisson poisson(grid);
        AlignedVector<double> potential(grid.nodes());
        const AlignedVector<double> aligned(charge.begin(), charge.end());
        poisson.transform(aligned);
        poisson.solve(Poisson::wall_harmonics(wall), potential);

        const std::vector<double> reference = CholmodPoisson(grid).solve(charge, wall);
        double worst = 0, largest = 0;
        for (std::size_t node = 0; node < grid.nodes(); ++node) {
            worst = std::fmax(worst, std::abs(potential[node] - reference[node]));
            largest = std::fmax(largest, std::abs(reference[node]));
            CHECK(std::isfinite(potential[node]));
        }
        MESSAGE(size.n_r << " x " << size.n_theta << ": " << worst / largest);
        CHECK(largest > 1000);
        CHECK(worst / largest < 1e-10);  // both solvers round at about 1e-13
    }
}
