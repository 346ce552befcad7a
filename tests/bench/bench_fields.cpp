// SPDX-License-Identifier: MIT
// The field phase on 48 x 160 and 64 x 256 cells beside the library's raw time for its transforms, and beside the
// back-solve of a sparse Cholesky factor of the same matrix.
#include <benchmark/benchmark.h>

#include <fftw3.h>

#include <cmath>
#include <random>

#include "fields/poisson.hpp"
#include "fields/surface_field.hpp"
#include "pic/force_table.hpp"
#include "tests/cholmod_poisson.hpp"

namespace spokewright {
namespace {

struct Problem {
    explicit Problem(const benchmark::State& state)
        : grid{1.95e-3, 4.45e-3, 9.5e-3, static_cast<int>(state.range(0)), static_cast<int>(state.range(1))},
          charge(grid.nodes()),
          potential(grid.nodes()),
          wall(static_cast<std::size_t>(grid.n_theta)) {
        std::mt19937 random(1);
        std::uniform_real_distribution<double> uniform(-1, 0);
        for (double& value : charge) {
            value = 1e-15 * uniform(random);
        }
        for (int j = 0; j < grid.n_theta; ++j) {
            wall[static_cast<std::size_t>(j)] = 4000 + 300 * std::cos(5 * grid.theta(j));
        }
        wall_harmonics = Poisson::wall_harmonics(wall);
    }
    PolarGrid grid;
    AlignedVector<double> charge, potential;
    std::vector<double> wall;
    Poisson::Harmonics wall_harmonics;
};

void raw_transforms(benchmark::State& state) {
    Problem problem(state);
    const int rows = problem.grid.n_r + 1, length = problem.grid.n_theta, harmonics = length / 2 + 1;
    AlignedVector<std::complex<double>> spectrum(static_cast<std::size_t>(rows) * static_cast<std::size_t>(harmonics));
    auto* raw = reinterpret_cast<fftw_complex*>(spectrum.data());
    fftw_plan forward = fftw_plan_many_dft_r2c(1, &length, rows, problem.charge.data(), nullptr, 1, length, raw,
                                               nullptr, 1, harmonics, FFTW_ESTIMATE | FFTW_PRESERVE_INPUT);
    fftw_plan backward = fftw_plan_many_dft_c2r(1, &length, rows, raw, nullptr, 1, harmonics, problem.potential.data(),
                                                nullptr, 1, length, FFTW_ESTIMATE);
    for (auto _ : state) {
        fftw_execute(forward);
        fftw_execute(backward);
        benchmark::ClobberMemory();
    }
    fftw_destroy_plan(forward);
    fftw_destroy_plan(backward);
}

void poisson(benchmark::State& state) {
    Problem problem(state);
    Poisson solver(problem.grid);
    for (auto _ : state) {
        solver.transform(problem.charge);
        solver.solve(problem.wall_harmonics, problem.potential);
        benchmark::ClobberMemory();
    }
}

void cholmod_back_solve(benchmark::State& state) {
    const Problem problem(state);
    CholmodPoisson solver(problem.grid);
    solver.set_right_side({problem.charge.begin(), problem.charge.end()}, problem.wall);
    for (auto _ : state) {
        solver.back_solve();
        benchmark::ClobberMemory();
    }
}

void field_and_force(benchmark::State& state) {
    Problem problem(state);
    Poisson solver(problem.grid);
    SurfaceField surface(problem.grid);
    ForceTable force({problem.grid, 3e-12});
    const std::vector<double> magnetic(static_cast<std::size_t>(problem.grid.n_r) + 1, 0.18);
    for (auto _ : state) {
        solver.transform(problem.charge);
        solver.solve(problem.wall_harmonics, problem.potential);
        surface.update(solver, problem.potential, problem.charge);
        force.update(problem.potential, surface, magnetic);
        benchmark::ClobberMemory();
    }
}

#define ON_TWO_GRIDS Args({48, 160})->Args({64, 256})->Unit(benchmark::kMicrosecond)
BENCHMARK(raw_transforms)->ON_TWO_GRIDS;
BENCHMARK(poisson)->ON_TWO_GRIDS;
BENCHMARK(cholmod_back_solve)->ON_TWO_GRIDS;
BENCHMARK(field_and_force)->ON_TWO_GRIDS;

}  // namespace
}  // namespace spokewright
