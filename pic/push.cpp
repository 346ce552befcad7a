// SPDX-License-Identifier: MIT
#include "pic/push.hpp"

#include <omp.h>

#include <algorithm>
#include <cmath>

namespace spokewright {
namespace {

struct Kick {
    float r, theta;
};

inline Kick half_kick(const CellForce& cell, const CellShare& at) {
    return {(cell.radial + cell.radial_rise * at.azimuthal) * (1.0f + cell.slope * (at.depth - 0.5f)),
            cell.along + cell.along_rise * at.radial};
}

inline const CellForce& cell_of(const ForceTable& force, const CellShare& at) {
    return force.cells()[static_cast<std::size_t>(at.i) * force.stride() + static_cast<std::size_t>(at.j)];
}

/// arctan for |x| <= 0.3, to 1e-7 of x: the half angle of one step as seen from the axis.
inline float short_arctan(float x) {
    const float x2 = x * x;
    return x * (1.0f - x2 * (1.0f / 3 - x2 * (1.0f / 5 - x2 * (1.0f / 7 - x2 * (1.0f / 9)))));
}

}  // namespace

Push::Push(const StepUnits& units, int threads)
    : units_(units), threads_(threads), bend_(radial_bend(units)), thread_hits_(static_cast<std::size_t>(threads)) {}

void Push::advance_range(ElectronStore& store, const ForceTable& force, std::size_t begin, std::size_t end,
                         std::vector<std::uint32_t>& hits) const {
    const float inverse_c2 = static_cast<float>(1 / (units_.light() * units_.light()));
    const float cathode_cells = static_cast<float>(units_.cathode_cells());
    const float theta_scale = static_cast<float>(2 * kAzimuthalOne / units_.grid.dtheta());
    // A step of over 7 cells would overflow the fixed-point radius; start_checks refuses such a clock long before.
    const float longest = 7.0f;
    const std::int32_t radial_end = units_.radial_end();
    const std::int32_t turn_end = units_.azimuthal_end();
    for (std::size_t p = begin; p < end; ++p) {
        const CellShare at = cell_share(store.r[p], store.theta[p], bend_.data());
        const CellForce& cell = cell_of(force, at);
        const Kick kick = half_kick(cell, at);
        const float half_turn = cell.turn + cell.turn_rise * at.radial;

        // u: n - 1/2 -> n + 1/2
        const float minus_r = store.u_r[p] + kick.r;
        const float minus_theta = store.u_theta[p] + kick.theta;
        const float gamma = std::sqrt(1.0f + (minus_r * minus_r + minus_theta * minus_theta) * inverse_c2);
        const float t = half_turn / gamma;
        const float s = 2.0f * t / (1.0f + t * t);
        const float prime_r = minus_r + minus_theta * t;
        const float prime_theta = minus_theta - minus_r * t;
        const float u_r = minus_r + prime_theta * s + kick.r;
        const float u_theta = minus_theta - prime_r * s + kick.theta;

        // r, theta: n -> n + 1 along a straight line from (rho, 0) in the local Cartesian frame
        const float inverse_gamma = 1.0f / std::sqrt(1.0f + (u_r * u_r + u_theta * u_theta) * inverse_c2);
        const float rho = cathode_cells + static_cast<float>(store.r[p]) * (1.0f / kRadialOne);
        const float x = rho + u_r * inverse_gamma;
        const float y = u_theta * inverse_gamma;
        const float half_tangent = y / (x + std::sqrt(x * x + y * y));  // tan of half the angle swept
        const float rise = std::clamp(u_r * inverse_gamma + y * half_tangent, -longest, longest);
        const std::int32_t r = store.r[p] + static_cast<std::int32_t>(std::lrint(rise * kRadialOne));
        std::int32_t theta =
            store.theta[p] + static_cast<std::int32_t>(std::lrint(theta_scale * short_arctan(half_tangent)));
        theta += theta < 0 ? turn_end : 0;
        theta -= theta >= turn_end ? turn_end : 0;

        // the same velocity in the polar frame of the new place
        const float sine = 2.0f * half_tangent / (1.0f + half_tangent * half_tangent);
        const float turned_r = u_r + u_theta * half_tangent;
        const float turned_theta = u_theta - u_r * half_tangent;
        store.u_r[p] = u_r + turned_theta * sine;
        store.u_theta[p] = u_theta - turned_r * sine;
        store.r[p] = r;
        store.theta[p] = theta;
        if (r <= 0 || r >= radial_end) {
            hits.push_back(static_cast<std::uint32_t>(p));
        }
    }
}

void Push::advance(ElectronStore& store, const ForceTable& force) {
    // Contiguous shares in thread order keep the joined list rising, whatever the number of threads.
#pragma omp parallel num_threads(threads_)
    {
        const auto thread = static_cast<std::size_t>(omp_get_thread_num());
        const auto team = static_cast<std::size_t>(omp_get_num_threads());
        thread_hits_[thread].clear();
        advance_range(store, force, store.size() * thread / team, store.size() * (thread + 1) / team,
                      thread_hits_[thread]);
#pragma omp single
        for (std::size_t idle = team; idle < thread_hits_.size(); ++idle) {
            thread_hits_[idle].clear();
        }
    }
    hits_.clear();
    for (const auto& part : thread_hits_) {
        hits_.insert(hits_.end(), part.begin(), part.end());
    }
}

double Push::kinetic_energy_eV(const ElectronStore& store, const ForceTable& force) const {
    double sum = 0;
    for (std::size_t p = 0; p < store.size(); ++p) {
        const CellShare at = cell_share(store.r[p], store.theta[p], bend_.data());
        const Kick kick = half_kick(cell_of(force, at), at);
        const double u_r = static_cast<double>(store.u_r[p] + kick.r);
        const double u_theta = static_cast<double>(store.u_theta[p] + kick.theta);
        sum += units_.energy_eV(u_r * u_r + u_theta * u_theta);
    }
    return sum;
}

}  // namespace spokewright
