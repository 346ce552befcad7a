// SPDX-License-Identifier: MIT
// The plain step: double precision, SI, one electron after the other, written as the textbook has it (J. P. Boris,
// Proc. 4th Conf. on Numerical Simulation of Plasmas (1970); C. K. Birdsall & A. B. Langdon, Plasma Physics via
// Computer Simulation (1985), chs. 2, 4, 14). It knows nothing of pic/. It is the oracle of the fast step and the
// measure of its speed, and it is pinned (test_pinned_steps.cpp): a change here changes what every published ratio
// means.
#pragma once

#include <span>
#include <vector>

#include "fields/polar_grid.hpp"

namespace spokewright::oracle {

struct Electrons {
    std::vector<double> r, theta;      // m; rad, 0..2 pi
    std::vector<double> u_r, u_theta;  // gamma v, m/s
};

class ReferenceStep {
public:
    ReferenceStep(const PolarGrid& grid, double dt) : grid_(grid), dt_(dt) {}

    /// One leapfrog step. `potential`: V, [n_r + 1][n_theta]; `surface_share`: field at the cathode over its mean in
    /// the first cell; `magnetic`: T, [n_r + 1]. Electrons beyond an electrode stay there; counts them.
    std::size_t push(Electrons& electrons, std::span<const double> potential, double surface_share,
                     std::span<const double> magnetic) const;

    /// Adds the electrons to the nodes, in electrons, [n_r + 1][n_theta].
    void deposit(const Electrons& electrons, std::span<double> nodes) const;

private:
    PolarGrid grid_;
    double dt_;
};

}  // namespace spokewright::oracle
