// SPDX-License-Identifier: MIT
// The diocotron instability of an annular electron column between coaxial conductors: theory, and the column itself
// laid into a smooth bore. R. H. Levy, Phys. Fluids 8, 1288 (1965).
#pragma once

#include <array>
#include <cmath>
#include <complex>

#include "pic/macro_charge.hpp"
#include "tests/smooth_bore.hpp"

namespace spokewright {

/// Conductors a and b, column from r1 to r2; m. The inner conductor carries no charge.
struct ColumnShape {
    double a, r1, r2, b;

    double area() const { return kPi * (r2 * r2 - r1 * r1); }
};

/// omega / omega_D of the faster-growing of the two waves exp(i l theta - i omega t), or of the one that turns with the
/// outer edge when both are stable, and the edges' r xi (xi: displacement), the larger one 1.
struct ColumnWave {
    std::complex<double> frequency;
    std::array<std::complex<double>, 2> edge;
};

inline ColumnWave column_wave(const ColumnShape& shape, int l) {
    const auto green = [&](double x, double y) {  // x the smaller; 1 / (2 l) of it is the potential of a sheet
        return (std::pow(x, l) - std::pow(shape.a, 2 * l) * std::pow(x, -l)) *
               (std::pow(y, -l) - std::pow(y, l) / std::pow(shape.b, 2 * l)) / (1 - std::pow(shape.a / shape.b, 2 * l));
    };
    const double ratio = shape.r1 / shape.r2;
    const double inner = green(shape.r1, shape.r1);  // the inner edge stands still: no charge within it
    const double outer = l * (1 - ratio * ratio) - green(shape.r2, shape.r2);
    const double across = green(shape.r1, shape.r2);
    const std::complex<double> root = std::sqrt(
        std::complex<double>(0.25 * (inner - outer) * (inner - outer) - across * across));  // imaginary: +i, growing
    const double mean = 0.5 * (inner + outer);
    const std::complex<double> one = mean + root, other = mean - root;
    const bool first = one.imag() > 0 || std::abs(one - outer) < std::abs(other - outer);
    ColumnWave wave{first ? one : other, {across, inner - (first ? one : other)}};
    const double largest = std::fmax(std::abs(wave.edge[0]), std::abs(wave.edge[1]));
    for (std::complex<double>& edge : wave.edge) edge /= largest;
    return wave;
}

/// A cold column in a smooth bore with a silent cathode; on equally filled rings, so that no harmonic but those asked
/// for is excited, each electron on the slow circle of its radius.
class AnnularColumn {
public:
    static constexpr double kField = 0.1;     // T; speeds stay below 0.01 c
    static constexpr double kStepTurn = 0.4;  // rad of gyration in a step: resolved, though a cold column has none

    /// `strength`: (omega_p / omega_c)^2, small, for the theory has no inertia.
    AnnularColumn(const ColumnShape& shape, double strength, const GridSettings& grid, int rings, int per_ring)
        : shape_(shape), rings_(rings), per_ring_(per_ring), deck_(column_deck(strength, grid)) {
        // The macro-charge comes in whole electrons of the deck's hub: the density is that, to 1e-4.
        density_ =
            rings * per_ring * -macro_charge_of(deck_) / kElementaryCharge / (shape.area() * deck_.tube.axial_height);
    }

    const Deck& deck() const { return deck_; }
    double turn() const { return kElementaryCharge * kField / kElectronMass; }  // cyclotron frequency, rad/s
    double diocotron_frequency() const { return kElementaryCharge * density_ / (2 * kVacuumPermittivity * kField); }

    /// With the edges displaced by the wave's edges times `amplitude` (a share of r2) in harmonic l.
    void load(InteractionSpace& space, int l, double amplitude) const {
        const ColumnWave wave = column_wave(shape_, l);
        for (int ring = 0; ring < rings_; ++ring) {
            const double share = (ring + 0.5) / rings_;
            const double radius = std::sqrt(shape_.r1 * shape_.r1 + share * shape_.area() / kPi);
            const double start = ring * 0.6180339887498949;
            for (int k = 0; k < per_ring_; ++k) {
                place(space, wave, l, amplitude, radius, 2 * kPi * (k + start - std::floor(start)) / per_ring_);
            }
        }
        space.settle_fields();
    }

    /// Harmonic l of the charge on the anode, C: space charge times r^l - a^2l r^-l, 1 on the anode.
    std::complex<double> anode_harmonic(const SpaceView& view, int l) const {
        std::complex<double> sum;
        const double inner = std::pow(shape_.a, 2 * l);
        const double scale = std::pow(shape_.b, l) - inner * std::pow(shape_.b, -l);
        for (int i = 0; i <= view.grid.n_r; ++i) {
            const double r = view.grid.radius(i);
            const double weight = (std::pow(r, l) - inner * std::pow(r, -l)) / scale;
            for (int j = 0; j < view.grid.n_theta; ++j) {
                sum += std::polar(weight * view.node_charge[view.grid.node(i, j)], -l * view.grid.theta(j));
            }
        }
        return sum;
    }

private:
    Deck column_deck(double strength, const GridSettings& grid) const {
        const double n =
            strength * kVacuumPermittivity * kElectronMass * turn() * turn() / kElementaryCharge / kElementaryCharge;
        // The anode voltage that leaves the inner conductor without charge.
        const double ratio = shape_.r1 / shape_.r2;
        const double within = 0.5 * (1 - ratio * ratio) + ratio * ratio * std::log(ratio);
        const double voltage = kElementaryCharge * n / (2 * kVacuumPermittivity) * shape_.r2 * shape_.r2 *
                               (within + (1 - ratio * ratio) * std::log(shape_.b / shape_.r2));
        Deck deck = silent(smooth_bore(shape_.a, shape_.b, voltage, kField));
        deck.grid = grid;
        deck.clock.step = kStepTurn / turn();
        deck.electrons.target_count = 1000000;
        const double hub = -macro_charge_of(deck) * 1e6;
        const double column = kElementaryCharge * n * shape_.area() * deck.tube.axial_height;
        deck.electrons.target_count = std::llround(hub * rings_ * per_ring_ / column);
        return deck;
    }

    void place(InteractionSpace& space, const ColumnWave& wave, int l, double amplitude, double radius,
               double theta) const {
        // r xi_r = x exp(i l theta), with x linear between the edges; xi_theta keeps the density.
        const std::complex<double> phase = std::polar(amplitude * shape_.r2 * shape_.r2, l * theta);
        const std::complex<double> slope = (wave.edge[1] - wave.edge[0]) / (shape_.r2 - shape_.r1);
        const std::complex<double> x = wave.edge[0] + slope * (radius - shape_.r1);
        const double moved_radius = radius + (x * phase).real() / radius;
        const double moved_theta = theta - (slope * phase / std::complex<double>(0, l)).real() / radius;
        // Slow rotation: omega^2 - omega_c omega + (omega_p^2 / 2)(1 - r1^2 / r^2) = 0, at the unmoved radius.
        const double pull = diocotron_frequency() * (1 - shape_.r1 * shape_.r1 / (radius * radius)) * turn();
        const double spin = 0.5 * turn() * (1 - std::sqrt(1 - 4 * pull / (turn() * turn())));
        const double back = 0.5 * deck_.clock.step * spin, u = spin * moved_radius;
        space.place_electron(moved_radius, moved_theta, u * std::sin(back), u * std::cos(back));
    }

    ColumnShape shape_;
    int rings_, per_ring_;
    Deck deck_;
    double density_ = 0;
};

}  // namespace spokewright
