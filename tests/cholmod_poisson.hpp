// SPDX-License-Identifier: MIT
// The equations of fields/poisson as a sparse matrix over the inner nodes, solved by CHOLMOD (Y. Chen, T. A. Davis,
// W. W. Hager & S. Rajamanickam, ACM Trans. Math. Softw. 35, 22 (2008)): radial fluxes through ln(r_{i+1} / r_i),
// azimuthal ones through the integral of dr / r over the cell, charge on the right.
#pragma once

#include <suitesparse/cholmod.h>

#include <algorithm>
#include <cmath>
#include <vector>

#include "fields/polar_grid.hpp"
#include "inputs/constants.hpp"

namespace spokewright {

class CholmodPoisson {
public:
    explicit CholmodPoisson(const PolarGrid& grid) : grid_(grid) {
        cholmod_start(&common_);
        entries_ = cholmod_allocate_triplet(unknowns(), unknowns(), 6 * unknowns(), -1, CHOLMOD_REAL, &common_);
        for (int i = 1; i < grid_.n_r; ++i) {
            for (int j = 0; j < grid_.n_theta; ++j) {
                add_node(i, j);
            }
        }
        matrix_ = cholmod_triplet_to_sparse(entries_, 0, &common_);
        factor_ = cholmod_analyze(matrix_, &common_);
        cholmod_factorize(matrix_, factor_, &common_);
        right_ = cholmod_zeros(unknowns(), 1, CHOLMOD_REAL, &common_);
    }
    ~CholmodPoisson() {
        cholmod_free_dense(&right_, &common_);
        cholmod_free_dense(&solution_, &common_);
        cholmod_free_dense(&work_, &common_);
        cholmod_free_dense(&more_work_, &common_);
        cholmod_free_factor(&factor_, &common_);
        cholmod_free_sparse(&matrix_, &common_);
        cholmod_free_triplet(&entries_, &common_);
        cholmod_finish(&common_);
    }
    CholmodPoisson(const CholmodPoisson&) = delete;
    CholmodPoisson& operator=(const CholmodPoisson&) = delete;

    /// Charge of the nodes, C, [n_r + 1][n_theta], and wall potential, V, [n_theta].
    void set_right_side(const std::vector<double>& charge, const std::vector<double>& wall) {
        auto* right = static_cast<double*>(right_->x);
        std::copy(charge.begin() + grid_.n_theta, charge.end() - grid_.n_theta, right);
        double* last = right + unknown(grid_.n_r - 1, 0);
        for (int j = 0; j < grid_.n_theta; ++j) {
            last[j] += outward(grid_.n_r - 1) * wall[static_cast<std::size_t>(j)];
        }
    }

    /// The two triangular solves, nothing else.
    void back_solve() {
        cholmod_solve2(CHOLMOD_A, factor_, right_, nullptr, &solution_, nullptr, &work_, &more_work_, &common_);
    }

    std::vector<double> solve(const std::vector<double>& charge, const std::vector<double>& wall) {
        set_right_side(charge, wall);
        back_solve();
        std::vector<double> potential(grid_.nodes(), 0.0);
        const auto* inner = static_cast<const double*>(solution_->x);
        std::copy(inner, inner + unknowns(), potential.begin() + grid_.n_theta);
        std::copy(wall.begin(), wall.end(), potential.end() - grid_.n_theta);
        return potential;
    }

private:
    std::size_t unknowns() const { return static_cast<std::size_t>((grid_.n_r - 1) * grid_.n_theta); }
    int unknown(int i, int j) const { return (i - 1) * grid_.n_theta + (j + grid_.n_theta) % grid_.n_theta; }
    double scale() const { return kVacuumPermittivity * grid_.axial_height; }
    double outward(int i) const { return scale() * grid_.dtheta() / std::log(grid_.radius(i + 1) / grid_.radius(i)); }

    void add(int row, int column, double value) {
        if (row < column) return;  // the lower triangle is all that CHOLMOD reads
        static_cast<int*>(entries_->i)[entries_->nnz] = row;
        static_cast<int*>(entries_->j)[entries_->nnz] = column;
        static_cast<double*>(entries_->x)[entries_->nnz] = value;
        ++entries_->nnz;
    }

    void add_node(int i, int j) {
        const double radius = grid_.radius(i), dr = grid_.dr();
        const double around = scale() * std::log((radius + dr / 2) / (radius - dr / 2)) / grid_.dtheta();
        const int row = unknown(i, j);
        add(row, row, outward(i - 1) + outward(i) + 2 * around);
        if (i > 1) add(row, unknown(i - 1, j), -outward(i - 1));
        if (i + 1 < grid_.n_r) add(row, unknown(i + 1, j), -outward(i));
        add(row, unknown(i, j - 1), -around);
        add(row, unknown(i, j + 1), -around);
    }

    PolarGrid grid_;
    cholmod_common common_{};
    cholmod_triplet* entries_ = nullptr;
    cholmod_sparse* matrix_ = nullptr;
    cholmod_factor* factor_ = nullptr;
    cholmod_dense* right_ = nullptr;
    cholmod_dense* solution_ = nullptr;
    cholmod_dense* work_ = nullptr;
    cholmod_dense* more_work_ = nullptr;
};

}  // namespace spokewright
