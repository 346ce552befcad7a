// SPDX-License-Identifier: MIT
#include "fields/resonators.hpp"

#include <cmath>

#include "inputs/constants.hpp"

namespace spokewright {

std::complex<double> load_admittance(const LoadSettings& load) {
    const std::complex<double> gamma = std::polar((load.vswr - 1) / (load.vswr + 1), load.phase);
    return (1.0 - gamma) / (1.0 + gamma);
}

std::complex<double> Resonator::amplitude() const {
    return {voltage, current / std::sqrt(inverse_inductance * capacitance)};
}

double Resonator::energy() const {
    return 0.5 * capacitance * voltage * voltage + 0.5 * current * current / inverse_inductance;
}

Resonators::Resonators(const CircuitSettings& circuit, const LoadSettings& load, int vane_count, double dt,
                       const DriveSettings& drive)
    : dt_(dt), drive_(drive) {
    if (circuit.source == CircuitSource::none) {
        return;
    }
    const std::complex<double> y = load_admittance(load);
    for (std::size_t entry = 0; entry < circuit.modes.size(); ++entry) {
        const ModeEntry& mode = circuit.modes[entry];
        for (VanePattern& pattern : vane_patterns(vane_count, mode.number)) {
            Resonator resonator{std::move(pattern), entry, 0, 0, 0, 0};
            const double omega = 2 * kPi * mode.frequency;
            // A small susceptance b in units of omega C / Q_ext moves the resonance by -b / (2 Q_ext) of itself.
            const double loaded = omega * std::sqrt(1 - y.imag() / mode.external_q);
            const double warped = 2 / dt * std::tan(0.5 * loaded * dt);
            resonator.capacitance = mode.capacitance * gap_square_sum(resonator.pattern);
            resonator.wall_conductance = omega * resonator.capacitance / mode.unloaded_q;
            resonator.load_conductance = omega * resonator.capacitance * y.real() / mode.external_q;
            resonator.inverse_inductance = warped * warped * resonator.capacitance;
            resonators_.push_back(std::move(resonator));
        }
    }
}

double Resonators::drive_current(const Resonator& resonator, double time) const {
    if (drive_.power <= 0 || resonator.pattern.mode != drive_.mode || time < drive_.start) {
        return 0;
    }
    const double phase = 2 * kPi * drive_.frequency * time + drive_.phase;
    const double patterns = resonator.pattern.standing == Standing::alternating ? 1 : 2;
    const double amplitude = std::sqrt(8 * resonator.load_conductance * drive_.power / patterns);
    // cos(n theta - omega t): the sine pattern lags by a quarter period.
    return amplitude * (resonator.pattern.standing == Standing::sine ? std::sin(phase) : std::cos(phase));
}

ResonatorEnergy Resonators::advance(std::span<const double> induced, double time) {
    ResonatorEnergy energy;
    for (std::size_t k = 0; k < resonators_.size(); ++k) {
        Resonator& r = resonators_[k];
        const double conductance = r.wall_conductance + r.load_conductance;
        const double drive = drive_current(r, time + 0.5 * dt_);
        const double incident = drive == 0 ? 0 : 0.5 * drive / r.load_conductance;  // V, the generator's wave
        const double middle = (induced[k] / dt_ + drive + 2 * r.capacitance / dt_ * r.voltage - r.current) /
                              (2 * r.capacitance / dt_ + conductance + 0.5 * dt_ * r.inverse_inductance);
        r.voltage = 2 * middle - r.voltage;
        r.current += dt_ * middle * r.inverse_inductance;
        energy.from_electrons += middle * induced[k];
        energy.wall_loss += dt_ * r.wall_conductance * middle * middle;
        energy.load += dt_ * r.load_conductance * (middle - incident) * (middle - incident);
        energy.drive += dt_ * r.load_conductance * incident * incident;
    }
    return energy;
}

double Resonators::prime(int mode, double voltage) {
    const double before = energy();
    for (Resonator& r : resonators_) {
        if (r.pattern.mode != mode) {
            continue;
        }
        // cos(n theta - omega t): the sine resonator lags by a quarter period, so its start is all current.
        if (r.pattern.standing == Standing::sine) {
            r.current -= voltage * std::sqrt(r.inverse_inductance * r.capacitance);
        } else {
            r.voltage += voltage;
        }
    }
    return energy() - before;
}

double Resonators::energy() const {
    double sum = 0;
    for (const Resonator& r : resonators_) {
        sum += r.energy();
    }
    return sum;
}

}  // namespace spokewright
