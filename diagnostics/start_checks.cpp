// SPDX-License-Identifier: MIT
#include "diagnostics/start_checks.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>

#include "diagnostics/current_estimate.hpp"
#include "diagnostics/theory.hpp"
#include "fields/resonators.hpp"
#include "inputs/constants.hpp"

namespace spokewright {
namespace {

/// From `doubtful` on a number draws a warning, from `hopeless` on it stops the run.
struct Limit {
    double doubtful;
    double hopeless;
};

// A leapfrog's phase error is (angle)^2 / 24 a radian: 0.4 % at 0.3, 1 % at 0.5, where a cycloid has a dozen corners.
// C. K. Birdsall & A. B. Langdon, Plasma Physics via Computer Simulation (1985), sections 4-2 and 4-4.
constexpr Limit kAngleAStep{0.3, 0.5};
// Steps an unmagnetised electron needs to cross the gap: below 20 the entry and exit steps are a tenth of the flight.
constexpr Limit kStepsAcross{20, 8};
// An electron at the full voltage that leaps over cells does not feel the field in them; beyond 6 the push would clip
// it.
constexpr Limit kCellsAStep{3, 6};
// The hub's edge smears over about two cells (the linear weighting), so 8 leave a profile and 4 hardly one.
constexpr Limit kHubCells{8, 4};
// The potential goes from vane to vane across the gap: 2 cells are one node between, 4 a recognisable slope.
constexpr Limit kGapCells{4, 2};
// Density noise is 1 / sqrt(electrons a cell): 50 % at 4; below 0.2 the hub is a handful of beads.
constexpr Limit kElectronsACell{4, 0.2};
// Second-order differences see a wave of 16 cells at 0.97 of its slope, of 8 cells at 0.90, of 4 cells at 0.64.
constexpr Limit kCellsAWave{8, 4};
// The same in time; the drive is sampled once a step.
constexpr Limit kStepsAPeriod{30, 10};
// Share of a mode's field by which static fields are off (theory.hpp).
constexpr Limit kStaticError{0.05, 0.5};
// The load's susceptance moves a mode by Im(y) / (2 Q_ext) of its frequency, to first order: at 5 % the second order is
// 0.4 % of the frequency, and a load that no longer is a small addition is a part of the resonator.
constexpr Limit kLoadShift{0.05, 0.25};
// Pushing, pulling and loading together move a mode by a few per cent (common practice, no source).
constexpr double kFrequencyRoom = 0.05;

class Checks {
public:
    explicit Checks(const Deck& deck)
        : deck_(deck),
          r_c_(deck.tube.cathode_radius),
          r_a_(deck.tube.anode_radius),
          voltage_(deck.supply.anode_voltage),
          field_(mean_field(deck)),
          hull_(hull_voltage(field_, r_c_, r_a_)) {}

    std::vector<Finding> run() {
        check_step();
        if (voltage_ < hull_) check_hub();
        if (!deck_.circuit.modes.empty()) {
            check_gaps();
            for (const ModeEntry& mode : deck_.circuit.modes) {
                check_mode(mode);
                check_load(mode);
            }
            check_thresholds();
        }
        check_hull();
        check_emission();
        return std::move(findings_);
    }

private:
    void add(bool fatal, std::string text) { findings_.push_back({fatal, std::move(text)}); }

    /// A number that must not be too large or, where doubtful > hopeless, too small. Nothing when it is fine.
    template <typename Text>
    void limit(double value, Limit allowed, Text text) {
        const bool floor = allowed.doubtful > allowed.hopeless;
        const auto beyond = [&](double edge) { return floor ? value < edge : value > edge; };
        if (beyond(allowed.doubtful)) add(beyond(allowed.hopeless), text());
    }

    void check_step();
    void check_hub();
    void check_gaps();
    void check_mode(const ModeEntry& mode);
    void check_load(const ModeEntry& mode);
    void check_thresholds();
    void check_hull();
    void check_emission();

    /// The next number of azimuthal cells that the deck would accept: whole cells a vane.
    int azimuthal_cells_for(double least) const {
        const int vanes = std::max(deck_.tube.vane_count, 1);
        return vanes * static_cast<int>(std::ceil(least / vanes - 1e-9));
    }
    double hartree(const ModeEntry& mode) const {
        return hartree_voltage(field_, r_c_, r_a_, mode.number, mode.frequency);
    }

    const Deck& deck_;
    double r_c_, r_a_, voltage_, field_, hull_;
    std::vector<Finding> findings_;
};

void Checks::check_step() {
    const double dt = deck_.clock.step;
    double largest = std::abs(field_);
    for (const FieldSample& sample : deck_.magnet.table) {
        largest = std::max(largest, std::abs(sample.field * deck_.magnet.field_scale));
    }
    const double omega_c = cyclotron_frequency(largest);
    limit(omega_c * dt, kAngleAStep, [&] {
        return fmt::format(
            "omega_c dt is {:.3g} (good up to {:.2g}, hopeless above {:.2g}): set clock.step_ps to at most "
            "{:.3g}",
            omega_c * dt, kAngleAStep.doubtful, kAngleAStep.hopeless, kAngleAStep.doubtful / omega_c * 1e12);
    });
    const double speed = electron_speed(voltage_);
    const double leap = speed * dt / ((r_a_ - r_c_) / deck_.grid.radial_cells);
    limit(leap, kCellsAStep, [&] {
        return fmt::format(
            "an electron at the full voltage crosses {:.2g} radial cells in a step (good up to {:.0f}, hopeless above "
            "{:.0f}): set clock.step_ps to at most {:.3g}",
            leap, kCellsAStep.doubtful, kCellsAStep.hopeless, dt * kCellsAStep.doubtful / leap * 1e12);
    });
    if (voltage_ < hull_) {
        const double density = brillouin_density(field_, r_c_, r_c_);  // densest at the cathode
        const double omega_p = kElementaryCharge * std::sqrt(density / (kVacuumPermittivity * kElectronMass));
        limit(omega_p * dt, kAngleAStep, [&] {
            return fmt::format(
                "omega_p dt is {:.3g} in the hub at the cathode (good up to {:.2g}, hopeless above {:.2g}): "
                "set clock.step_ps to at most {:.3g}",
                omega_p * dt, kAngleAStep.doubtful, kAngleAStep.hopeless, kAngleAStep.doubtful / omega_p * 1e12);
        });
        return;
    }
    const double flight = (r_a_ - r_c_) / std::sqrt(2 * kElementaryCharge * voltage_ / kElectronMass);
    limit(flight / dt, kStepsAcross, [&] {
        return fmt::format(
            "an electron at the full voltage crosses the gap in {:.0f} steps (good from {:.0f}, hopeless "
            "below {:.0f}): set clock.step_ps to at most {:.3g}",
            flight / dt, kStepsAcross.doubtful, kStepsAcross.hopeless, flight / kStepsAcross.doubtful * 1e12);
    });
}

void Checks::check_hub() {
    const double hub = brillouin_hub_radius(field_, r_c_, r_a_, voltage_) - r_c_;
    const double cells = hub / ((r_a_ - r_c_) / deck_.grid.radial_cells);
    limit(cells, kHubCells, [&] {
        return fmt::format(
            "the hub is {:.1f} radial cells thick (good from {:.0f}, hopeless below {:.0f}): set "
            "grid.radial_cells to at least {:.0f}",
            cells, kHubCells.doubtful, kHubCells.hopeless,
            std::ceil(deck_.grid.radial_cells * kHubCells.doubtful / cells));
    });
    const double hub_cells = std::max(cells, 1.0) * deck_.grid.azimuthal_cells;
    const double share = static_cast<double>(deck_.electrons.target_count) / hub_cells;
    limit(share, kElectronsACell, [&] {
        return fmt::format(
            "the hub holds {:.2g} macro-electrons a cell (good from {:.0f}, hopeless below {:.1f}): set "
            "electrons.target_count to at least {:.0f}",
            share, kElectronsACell.doubtful, kElectronsACell.hopeless, std::ceil(kElectronsACell.doubtful * hub_cells));
    });
}

void Checks::check_gaps() {
    if (deck_.tube.vane_count == 0) return;
    const double cells = deck_.tube.gap_share * deck_.grid.azimuthal_cells / deck_.tube.vane_count;
    limit(cells, kGapCells, [&] {
        return fmt::format(
            "a gap is {:.1f} azimuthal cells wide (good from {:.0f}, hopeless below {:.0f}): set "
            "grid.azimuthal_cells to at least {}",
            cells, kGapCells.doubtful, kGapCells.hopeless,
            azimuthal_cells_for(kGapCells.doubtful * deck_.tube.vane_count / deck_.tube.gap_share));
    });
}

void Checks::check_mode(const ModeEntry& mode) {
    const double cells = static_cast<double>(deck_.grid.azimuthal_cells) / mode.number;
    limit(cells, kCellsAWave, [&] {
        return fmt::format(
            "mode {} has {:.1f} azimuthal cells a wave (good from {:.0f}, hopeless below {:.0f}): set "
            "grid.azimuthal_cells to at least {}",
            mode.number, cells, kCellsAWave.doubtful, kCellsAWave.hopeless,
            azimuthal_cells_for(kCellsAWave.doubtful * mode.number));
    });
    const double steps = 1 / (mode.frequency * deck_.clock.step);
    limit(steps, kStepsAPeriod, [&] {
        return fmt::format(
            "mode {} has {:.1f} steps a period (good from {:.0f}, hopeless below {:.0f}): set clock.step_ps "
            "to at most {:.3g}",
            mode.number, steps, kStepsAPeriod.doubtful, kStepsAPeriod.hopeless,
            1e12 / (kStepsAPeriod.doubtful * mode.frequency));
    });
    const double radius = electrical_radius(r_a_, mode.frequency);
    const double error = static_field_error(radius, mode.number);
    limit(error, kStaticError, [&] {
        return fmt::format(
            "omega r_a / c is {:.2f} in mode {}: the static fields of this model are off by about {:.0f} % there (good "
            "up "
            "to {:.0f} %, hopeless above {:.0f} %); lower circuit.frequencies_GHz or tube.anode_radius_mm",
            radius, mode.number, 100 * error, 100 * kStaticError.doubtful, 100 * kStaticError.hopeless);
    });
    const double room = 0.5 / (deck_.clock.sample_every * deck_.clock.step);  // Hz, about the cold frequency
    if (room < kFrequencyRoom * mode.frequency) {
        add(false,
            fmt::format("the samples tell frequencies of mode {} apart only within {:.3g} MHz of the cold one (good "
                        "from {:.3g}): set clock.sample_every to at most {:.0f}",
                        mode.number, room * 1e-6, kFrequencyRoom * mode.frequency * 1e-6,
                        std::floor(0.5 / (kFrequencyRoom * mode.frequency * deck_.clock.step))));
    }
}

void Checks::check_load(const ModeEntry& mode) {
    const double shift = std::abs(load_admittance(deck_.load).imag()) / (2 * mode.external_q);
    limit(shift, kLoadShift, [&] {
        return fmt::format(
            "the load moves mode {} by {:.0f} % of its frequency (good up to {:.0f} %, hopeless above {:.0f} %): lower "
            "load.vswr or raise circuit.external_Q",
            mode.number, 100 * shift, 100 * kLoadShift.doubtful, 100 * kLoadShift.hopeless);
    });
}

void Checks::check_thresholds() {
    std::string list;
    double lowest = std::numeric_limits<double>::infinity();
    const ModeEntry* pi_mode = nullptr;
    for (const ModeEntry& mode : deck_.circuit.modes) {
        const double threshold = hartree(mode);
        if (threshold < lowest) lowest = threshold;
        list += fmt::format("{}mode {} {:.0f} V", list.empty() ? "" : ", ", mode.number, threshold);
        if (2 * mode.number == deck_.tube.vane_count) pi_mode = &mode;
    }
    if (!(lowest < voltage_)) {
        add(false, fmt::format("the anode voltage {:.0f} V is below the Hartree voltage of every mode ({}): expect no "
                               "oscillation; set supply.anode_voltage_V above {:.0f} or lower the magnetic field",
                               voltage_, list, lowest));
    } else if (pi_mode != nullptr && !(hartree(*pi_mode) < voltage_)) {
        add(false,
            fmt::format("the anode voltage {:.0f} V is below the Hartree voltage of the pi mode ({}): another mode "
                        "may run; set supply.anode_voltage_V above {:.0f} or lower the magnetic field",
                        voltage_, list, hartree(*pi_mode)));
    }
}

void Checks::check_hull() {
    // Without a field the deck means a diode, and nobody expects a cutoff.
    if (field_ == 0 || voltage_ < hull_) return;
    add(false,
        fmt::format("the anode voltage {:.0f} V is above the Hull voltage {:.0f} V: electrons reach the anode without "
                    "spokes; lower supply.anode_voltage_V or set a field above {:.1f} mT",
                    voltage_, hull_, 1e3 * hull_field(voltage_, r_c_, r_a_)));
}

void Checks::check_emission() {
    const CathodeSettings& cathode = deck_.cathode;
    const double cap = cathode_supply(deck_);
    if (!std::isfinite(cap) || cathode.secondary_emission) return;  // secondaries feed a cold cathode
    const double expected = expected_current(deck_);
    if (cap >= expected) return;
    const double density = cap / (2 * kPi * r_c_ * deck_.tube.axial_height);
    const bool by_limit = cathode.emission_limit > 0 && density >= cathode.emission_limit * (1 - 1e-12);
    const std::string cure =
        fmt::format("raise cathode.{} until it gives {:.3g} A/cm^2",
                    by_limit ? "emission_limit_A_per_cm2" : "temperature_K", density * expected / cap * 1e-4);
    add(false, fmt::format("the cathode can emit {:.3g} A, the tube wants about {:.3g} A: expect starved spokes; {}",
                           cap, expected, cure));
}

}  // namespace

std::vector<Finding> start_checks(const Deck& deck) {
    return Checks(deck).run();
}

}  // namespace spokewright
