// SPDX-License-Identifier: MIT
#include "pic/electron_store.hpp"

namespace spokewright {

void ElectronStore::append(const Electron& electron) {
    r.push_back(electron.r);
    theta.push_back(electron.theta);
    u_r.push_back(electron.u_r);
    u_theta.push_back(electron.u_theta);
}

void ElectronStore::reserve(std::size_t capacity) {
    r.reserve(capacity);
    theta.reserve(capacity);
    u_r.reserve(capacity);
    u_theta.reserve(capacity);
}

void ElectronStore::resize(std::size_t size) {
    r.resize(size);
    theta.resize(size);
    u_r.resize(size);
    u_theta.resize(size);
}

void ElectronStore::remove(std::span<const std::uint32_t> rising) {
    // From the last hole down, the tail electron is never itself a hole that is still to be filled.
    std::size_t last = size();
    for (std::size_t k = rising.size(); k-- > 0;) {
        --last;
        const std::size_t hole = rising[k];
        r[hole] = r[last];
        theta[hole] = theta[last];
        u_r[hole] = u_r[last];
        u_theta[hole] = u_theta[last];
    }
    resize(last);
}

}  // namespace spokewright
