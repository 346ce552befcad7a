// SPDX-License-Identifier: MIT
// The macro-electrons: structure of arrays, 16 bytes an electron, in the units of step_units.hpp. All carry the same
// charge. Order matters only for reproducibility: holes are filled from the tail, new electrons go to the end.
#pragma once

#include <cstdint>
#include <span>

#include "fields/aligned.hpp"
#include "pic/particle_kernel.hpp"

namespace spokewright {

struct Electron {
    std::int32_t r;      // fixed point, cells from the cathode
    std::int32_t theta;  // fixed point, cells from theta = 0
    float u_r;           // gamma v, velocity units
    float u_theta;
};

class ElectronStore {
public:
    std::size_t size() const { return r.size(); }
    void append(const Electron& electron);
    Electron at(std::size_t index) const { return {r[index], theta[index], u_r[index], u_theta[index]}; }
    ElectronArrays arrays() { return {r.data(), theta.data(), u_r.data(), u_theta.data()}; }
    ElectronView view() const { return {r.data(), theta.data(), u_r.data(), u_theta.data()}; }
    void reserve(std::size_t capacity);
    void resize(std::size_t size);

    /// Removes the electrons named by rising indices; each hole takes the last electron.
    void remove(std::span<const std::uint32_t> rising);

    AlignedVector<std::int32_t> r;
    AlignedVector<std::int32_t> theta;
    AlignedVector<float> u_r;
    AlignedVector<float> u_theta;
};

}  // namespace spokewright
