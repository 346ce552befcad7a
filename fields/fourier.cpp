// SPDX-License-Identifier: MIT
#include "fields/fourier.hpp"

#include <fftw3.h>

#include <cmath>
#include <mutex>
#include <stdexcept>
#include <type_traits>

#include "fields/aligned.hpp"
#include "inputs/constants.hpp"

namespace spokewright {
namespace {

struct PlanDeleter {
    void operator()(fftw_plan plan) const { fftw_destroy_plan(plan); }
};
using Plan = std::unique_ptr<std::remove_pointer_t<fftw_plan>, PlanDeleter>;

// FFTW's planner keeps global tables; only execution is safe from many threads.
std::mutex planner_mutex;

fftw_complex* raw(std::complex<double>* values) {
    return reinterpret_cast<fftw_complex*>(values);
}

// A plan made for aligned arrays may use aligned loads, so an array that is not aligned must not reach it.
void require_aligned(const void* array) {
    if (fftw_alignment_of(static_cast<double*>(const_cast<void*>(array))) != 0) {
        throw std::invalid_argument("RowFourier: arrays must be AlignedVector storage");
    }
}

}  // namespace

struct RowFourier::Plans {
    Plan forward;
    Plan backward;
};

RowFourier::RowFourier(int rows, int length) : rows_(rows), length_(length), plans_(std::make_unique<Plans>()) {
    AlignedVector<double> values(static_cast<std::size_t>(rows) * static_cast<std::size_t>(length));
    AlignedVector<std::complex<double>> spectrum(static_cast<std::size_t>(rows) *
                                                 static_cast<std::size_t>(harmonics()));
    const std::lock_guard lock(planner_mutex);
    plans_->forward.reset(fftw_plan_many_dft_r2c(1, &length, rows, values.data(), nullptr, 1, length,
                                                 raw(spectrum.data()), nullptr, 1, harmonics(),
                                                 FFTW_ESTIMATE | FFTW_PRESERVE_INPUT));
    plans_->backward.reset(fftw_plan_many_dft_c2r(1, &length, rows, raw(spectrum.data()), nullptr, 1, harmonics(),
                                                  values.data(), nullptr, 1, length, FFTW_ESTIMATE));
    if (!plans_->forward || !plans_->backward) {
        throw std::invalid_argument("RowFourier: no plan for this size");
    }
}

RowFourier::~RowFourier() = default;
RowFourier::RowFourier(RowFourier&&) noexcept = default;
RowFourier& RowFourier::operator=(RowFourier&&) noexcept = default;

void RowFourier::forward(std::span<const double> values, std::span<std::complex<double>> harmonics) const {
    require_aligned(values.data());
    require_aligned(harmonics.data());
    // FFTW_PRESERVE_INPUT: the cast is safe, the input is not written.
    fftw_execute_dft_r2c(plans_->forward.get(), const_cast<double*>(values.data()), raw(harmonics.data()));
}

void RowFourier::backward(std::span<std::complex<double>> harmonics, std::span<double> values) const {
    require_aligned(harmonics.data());
    require_aligned(values.data());
    fftw_execute_dft_c2r(plans_->backward.get(), raw(harmonics.data()), values.data());
}

std::vector<double> amplitude_spectrum(std::span<const double> record) {
    const int length = static_cast<int>(record.size());
    if (length < 2) {
        return {};
    }
    AlignedVector<double> windowed(record.size());
    double window_sum = 0;
    for (int k = 0; k < length; ++k) {
        const double window = 0.5 * (1 - std::cos(2 * kPi * k / length));
        window_sum += window;
        windowed[static_cast<std::size_t>(k)] = window * record[static_cast<std::size_t>(k)];
    }
    const RowFourier fourier(1, length);
    AlignedVector<std::complex<double>> harmonics(static_cast<std::size_t>(fourier.harmonics()));
    fourier.forward(windowed, harmonics);
    std::vector<double> amplitude(harmonics.size());
    for (std::size_t k = 0; k < harmonics.size(); ++k) {
        amplitude[k] = 2 * std::abs(harmonics[k]) / window_sum;
    }
    return amplitude;
}

}  // namespace spokewright
