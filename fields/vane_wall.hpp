// SPDX-License-Identifier: MIT
// The anode wall: N vanes, vane i centred at 2 pi i / N, and what potential a set of vane voltages puts on r = r_a.
// On a tip the wall has the vane's value; across a gap it goes linearly from one vane's value to the next.
#pragma once

#include <span>
#include <vector>

#include "inputs/deck.hpp"

namespace spokewright {

enum class Standing { cosine, sine, alternating };  // alternating: the pi mode, its only resonator

/// One resonator's pattern: unit amplitude on the vanes.
struct VanePattern {
    int mode;  // n
    Standing standing;
    std::vector<double> vanes;  // [N] vane values
};

/// Two patterns a mode n < N/2 (cosine, sine), one for n = N/2.
std::vector<VanePattern> vane_patterns(int vane_count, int mode);

/// Sum over neighbours (s_i - s_{i+1})^2: capacitance of the mode over capacitance of one resonator.
double gap_square_sum(const VanePattern& pattern);

class VaneWall {
public:
    VaneWall(int vane_count, double gap_share);

    int vane_count() const { return vane_count_; }
    /// Wall value at angle theta (0..2 pi rad) for the vane values [N].
    double profile(std::span<const double> vanes, double theta) const;
    /// Wall values at n_theta equally spaced nodes from theta = 0, [n_theta].
    std::vector<double> profile_at_nodes(std::span<const double> vanes, int n_theta) const;
    /// 2 i on vane i, 2 i + 1 in the slot that follows it in +theta; theta in 0..2 pi rad.
    int sector(double theta) const;

private:
    int vane_count_;
    double gap_share_;
};

}  // namespace spokewright
