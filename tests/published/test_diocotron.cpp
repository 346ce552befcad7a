// SPDX-License-Identifier: MIT
// Source: R. H. Levy, Phys. Fluids 8, 1288 (1965), with an inner conductor (from memory): growth and frequency of the
// diocotron waves of an annular electron column, eigenvalues of a matrix of two rows, computed.
#include <doctest/doctest.h>

#include <cmath>
#include <string>
#include <vector>

#include "tests/annular_column.hpp"
#include "tests/published_row.hpp"

using namespace spokewright;

namespace {

using std::complex;

const std::string kSource = "R. H. Levy, Phys. Fluids 8, 1288 (1965), with an inner conductor (from memory), computed";
const std::string kReason =
    "required; the force is constant over a cell, inertia adds 0.3 to 0.5 (omega_p / omega_c)^2 = 0.5 %";

struct PrintedColumn {
    ColumnShape shape;
    std::vector<complex<double>> frequency;  // omega / omega_D for l = 2..6
};

// b = 10 mm. Six figures, computed from the formula on its own.
const PrintedColumn kThin{{2e-3, 4e-3, 5e-3, 10e-3},
                          {{0.36, 0.097140}, {0.54, 0.228504}, {0.72, 0.298827}, {0.90, 0.311722}, {1.08, 0.249420}}};
const PrintedColumn kWide{
    {4.4e-3, 5.5e-3, 7e-3, 10e-3},
    {{0.328160, 0.174114}, {0.518327, 0.243787}, {0.718176, 0.279054}, {0.920607, 0.258079}, {1.122038, 0.100266}}};
const ColumnShape kStable{4.4e-3, 4.6e-3, 7e-3, 10e-3};

complex<double> printed(const PrintedColumn& column, int l) {
    return column.frequency[static_cast<std::size_t>(l - 2)];
}

/// Slope over time of the logarithm of samples, by least squares: growth, and minus the frequency.
class LogSlope {
public:
    void add(double time, complex<double> sample) {
        log_ += count_ > 0 ? std::log(sample / last_) : 0;  // steps: the phase never jumps
        last_ = sample;
        ++count_;
        t_ += time;
        tt_ += time * time;
        y_ += log_;
        ty_ += time * log_;
    }
    complex<double> slope() const { return (count_ * ty_ - t_ * y_) / (count_ * tt_ - t_ * t_); }

private:
    double count_ = 0, t_ = 0, tt_ = 0;
    complex<double> log_, last_, y_, ty_;
};

/// omega / omega_D of harmonic l in a hot run over four 1 / omega_D. Its edges start displaced by one radial cell in
/// the wave itself. Much less, and the electrons of the edge notice the steps of the force from cell to cell; more, or
/// longer, and the wave is no longer small.
complex<double> run_frequency(const ColumnShape& shape, int l) {
    const AnnularColumn column(shape, 0.01, {118, 288}, 120, 288);
    InteractionSpace space(column.deck(), 1);
    column.load(space, l, space.units().grid.dr() / shape.r2);
    const double omega_d = column.diocotron_frequency();
    LogSlope fit;
    for (int k = 0; k <= 32; ++k) {
        while (space.time() * omega_d < k * 0.125) space.step();
        fit.add(space.time() * omega_d, column.anode_harmonic(space.view(), l));
    }
    CHECK(space.tally().electrons == 120 * 288);
    return complex<double>(0, 1) * fit.slope();
}

void check_column(const PrintedColumn& column, const std::string& name) {
    for (int l = 2; l <= 6; ++l) {
        const complex<double> theory = printed(column, l), run = run_frequency(column.shape, l);
        MESSAGE(name << " l = " << l << ": " << run << ", theory " << theory);
        const std::string wave = " of the diocotron wave l = " + std::to_string(l) + ", " + name + ", in omega_D";
        check_published({"growth rate" + wave, kSource, theory.imag(), run.imag(), 0.03, kReason});
        check_published({"frequency" + wave, kSource, theory.real(), run.real(), 0.03, kReason});
    }
}

}  // namespace

TEST_CASE("the formula of the diocotron waves gives the printed table") {
    for (const PrintedColumn* column : {&kThin, &kWide}) {
        for (int l = 2; l <= 6; ++l) {
            CHECK(std::abs(column_wave(column->shape, l).frequency - printed(*column, l)) < 1e-6);  // the last figure
        }
    }
    for (int l = 2; l <= 6; ++l) CHECK(column_wave(kStable, l).frequency.imag() == 0);
}

TEST_CASE("diocotron waves of a thin column grow as they should") {
    check_column(kThin, "column 0.4/0.5");
}

TEST_CASE("diocotron waves of a wide column grow as they should") {
    check_column(kWide, "column 0.55/0.7");
}

TEST_CASE("a column close to the inner conductor is stable") {
    double fastest = 0;
    for (int l = 2; l <= 6; ++l) {
        const complex<double> run = run_frequency(kStable, l);
        MESSAGE("stable l = " << l << ": " << run << ", theory " << column_wave(kStable, l).frequency);
        CHECK(relative_error(run.real(), column_wave(kStable, l).frequency.real()) < 0.03);  // as above
        fastest = std::fmax(fastest, std::abs(run.imag()));
    }
    check_published({"fastest change of amplitude, stable column 0.46/0.7, l = 2..6, in omega_D", kSource, 0, fastest,
                     0.01, "a tenth of the slowest growth of the unstable columns"});
}
