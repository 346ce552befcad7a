// SPDX-License-Identifier: MIT
#include "fields/vane_wall.hpp"

#include <cmath>

#include "inputs/constants.hpp"

namespace spokewright {

std::vector<VanePattern> vane_patterns(int vane_count, int mode) {
    const bool pi_mode = 2 * mode == vane_count;
    std::vector<VanePattern> patterns;
    for (const Standing standing : {Standing::cosine, Standing::sine}) {
        VanePattern pattern{mode, pi_mode ? Standing::alternating : standing, {}};
        for (int i = 0; i < vane_count; ++i) {
            const double phase = 2 * kPi * mode * i / vane_count;
            pattern.vanes.push_back(standing == Standing::cosine ? std::cos(phase) : std::sin(phase));
        }
        patterns.push_back(std::move(pattern));
        if (pi_mode) {
            break;
        }
    }
    return patterns;
}

double gap_square_sum(const VanePattern& pattern) {
    double sum = 0;
    for (std::size_t i = 0; i < pattern.vanes.size(); ++i) {
        const double gap = pattern.vanes[i] - pattern.vanes[(i + 1) % pattern.vanes.size()];
        sum += gap * gap;
    }
    return sum;
}

VaneWall::VaneWall(int vane_count, double gap_share) : vane_count_(vane_count), gap_share_(gap_share) {}

double VaneWall::profile(std::span<const double> vanes, double theta) const {
    const double pitches = theta / (2 * kPi) * vane_count_;
    const double below = std::floor(pitches);
    const auto vane = static_cast<std::size_t>(static_cast<int>(below) % vane_count_);
    const double left = vanes[vane];
    const double right = vanes[(vane + 1) % vanes.size()];
    const double half_tip = 0.5 * (1 - gap_share_);
    const double across = (pitches - below - half_tip) / gap_share_;  // 0 at the gap's start, 1 at its end
    return left + (right - left) * std::fmin(std::fmax(across, 0.0), 1.0);
}

std::vector<double> VaneWall::profile_at_nodes(std::span<const double> vanes, int n_theta) const {
    std::vector<double> values;
    for (int j = 0; j < n_theta; ++j) {
        values.push_back(profile(vanes, 2 * kPi * j / n_theta));
    }
    return values;
}

int VaneWall::sector(double theta) const {
    const double pitches = theta / (2 * kPi) * vane_count_;
    const double below = std::floor(pitches);
    const double within = pitches - below;
    const double half_tip = 0.5 * (1 - gap_share_);
    const int vane = static_cast<int>(below) % vane_count_;
    if (within < half_tip) {
        return 2 * vane;
    }
    return within <= 1 - half_tip ? 2 * vane + 1 : 2 * ((vane + 1) % vane_count_);
}

}  // namespace spokewright
