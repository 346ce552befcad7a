// SPDX-License-Identifier: MIT
// Source: C. K. Birdsall & A. B. Langdon, Plasma Physics via Computer Simulation (1985), ch. 12 (from memory): N
// uncorrelated particles of charge q have <|q_m|^2> = N q^2 in every harmonic, as normal noise. Without the factor
// k^2 lambda^2 / (1 + k^2 lambda^2) of a shielded plasma: the column is so thin that it is 1.
#include <doctest/doctest.h>

#include <array>
#include <cmath>
#include <complex>
#include <random>
#include <string>

#include "tests/published_row.hpp"
#include "tests/smooth_bore.hpp"

using namespace spokewright;

namespace {

constexpr int kElectrons = 5000, kColumns = 120, kHarmonics = 30, kCells = 96;
constexpr double kTemperature = 30, kField = 0.1;  // eV, T: gyration radius 0.13 mm, m = 30 about 0.2 mm a radian

Deck thin_column() {
    Deck deck = silent(smooth_bore(2e-3, 10e-3, 1, kField));
    deck.grid = {40, kCells};
    deck.clock.step = 2e-11;                // an eighteenth of a gyration
    deck.electrons.target_count = 5000000;  // a thousandth of what the volt would hold
    return deck;
}

/// A random Maxwellian between 4 and 8 mm, of even density.
void load(InteractionSpace& space, std::mt19937_64& random) {
    std::uniform_real_distribution<double> share(0, 1);
    std::normal_distribution<double> speed(0, std::sqrt(kTemperature * kElementaryCharge / kElectronMass));
    for (int k = 0; k < kElectrons; ++k) {
        const double radius = 1e-3 * std::sqrt(16 + 48 * share(random));
        const double theta = 2 * kPi * share(random), u_r = speed(random), u_theta = speed(random);
        space.place_electron(radius, theta, u_r, u_theta);
    }
    space.settle_fields();
}

/// Sums over columns and harmonics of |q_m|^2 / (N q^2), and of its square.
struct Noise {
    double sum = 0, squares = 0;
    std::array<std::complex<double>, kHarmonics> last;

    void add(const SpaceView& view) {
        for (int m = 1; m <= kHarmonics; ++m) {
            std::complex<double> harmonic;
            for (int j = 0; j < kCells; ++j) {
                double ray = 0;
                for (int i = 0; i <= view.grid.n_r; ++i) ray += view.node_charge[view.grid.node(i, j)];
                harmonic += std::polar(ray, -m * view.grid.theta(j));
            }
            // The linear deposit takes this much off, averaged over the place between two nodes: exact, aliases too.
            const double kept = 1 - (1 - std::cos(m * view.grid.dtheta())) / 3;
            const double power = std::norm(harmonic / view.macro_charge) / (kElectrons * kept);
            sum += power;
            squares += power * power;
            last[static_cast<std::size_t>(m - 1)] = harmonic / (view.macro_charge * std::sqrt(kElectrons * kept));
        }
    }
    double mean() const { return sum / (kColumns * kHarmonics); }
    double kurtosis() const { return squares / (kColumns * kHarmonics) / (mean() * mean()); }
};

}  // namespace

TEST_CASE("the noise of a thin Maxwellian column is that of uncorrelated electrons, and stays so") {
    std::mt19937_64 random(1);
    Noise loaded, moved;
    double likeness = 0;  // of the harmonics m > 20 before and after
    for (int column = 0; column < kColumns; ++column) {
        InteractionSpace space(thin_column(), 1);
        load(space, random);
        loaded.add(space.view());
        for (int k = 0; k < 45; ++k) space.step();  // two and a half gyrations
        CHECK(space.tally().electrons == kElectrons);
        moved.add(space.view());
        for (std::size_t m = 20; m < kHarmonics; ++m) likeness += (loaded.last[m] * std::conj(moved.last[m])).real();
    }
    likeness /= kColumns * (kHarmonics - 20.0);
    MESSAGE("loaded " << loaded.mean() << ", moved " << moved.mean() << ", <|q|^4> / <|q|^2>^2 " << loaded.kurtosis()
                      << ", " << moved.kurtosis() << ", likeness " << likeness);
    CHECK(likeness < 0.8);  // the electrons did move
    const std::string source = "C. K. Birdsall & A. B. Langdon (1985), ch. 12 (from memory): uncorrelated particles";
    check_published({"noise |q_m|^2 over N q^2, as loaded", source, 1, loaded.mean(), 0.05,
                     "three standard deviations of 3600 draws"});
    check_published({"noise |q_m|^2 over N q^2, after 2.5 gyrations of a hot run", source, 1, moved.mean(), 0.05,
                     "three standard deviations of 3600 draws"});
    check_published({"<|q_m|^4> / <|q_m|^2>^2 of that noise", source, 2, moved.kurtosis(), 0.1,
                     "three standard deviations of 3600 draws"});
}
