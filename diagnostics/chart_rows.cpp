// SPDX-License-Identifier: MIT
#include "diagnostics/chart_rows.hpp"

#include <fmt/format.h>

#include <cmath>
#include <limits>

#include "diagnostics/current_estimate.hpp"
#include "diagnostics/theory.hpp"
#include "inputs/constants.hpp"

namespace spokewright {
namespace {

constexpr double kUnknown = std::numeric_limits<double>::quiet_NaN();
constexpr double kWorthShowing = 1e-3;  // relativistic against not
enum Source { kNoSource, kLorentz, kHull, kBrillouin, kLimited, kNormalForm, kOutput, kDushman, kStatic, kOwnRule };

std::string wave_name(const ChartWave& wave) {
    return wave.k == 0 ? fmt::format("mode {}", wave.mode) : fmt::format("mode {}, m = {}", wave.mode, wave.harmonic);
}

std::string list_of(const std::vector<ChartWave>& waves) {
    std::string text;
    for (const ChartWave& wave : waves) {
        text += fmt::format("{}{} from {} V", text.empty() ? "" : "; ", wave_name(wave),
                            figure(wave.hartree_voltage.value));
    }
    return text;
}

class Rows {
public:
    explicit Rows(const Chart& chart) : c_(chart) {}

    std::vector<ChartRow> all() {
        add_point();
        add_cutoff();
        add_hub();
        add_pi_mode();
        add_window();
        add_efficiency();
        add_currents();
        add_measures();
        return std::move(rows_);
    }

private:
    enum Sweep { kAlways, kNotInSweep };

    /// One row; `scale` turns SI into its unit.
    void add(const char* key, std::string label, const char* unit, double scale, ChartValue value, std::string note,
             Source source, Sweep sweep = kAlways) {
        rows_.push_back({section_, key, std::move(label), unit, scale * value.value,
                         scale * nonrelativistic_worth_showing(value), std::move(note), source, sweep == kAlways});
    }
    void add(const char* key, std::string label, const char* unit, double scale, double value, std::string note,
             Source source, Sweep sweep = kAlways) {
        add(key, std::move(label), unit, scale, ChartValue{value, value}, std::move(note), source, sweep);
    }
    /// The note of a row that needs the pi mode.
    std::string with_pi(const std::string& note) const { return c_.no_pi_mode.empty() ? note : c_.no_pi_mode; }

    void add_point();
    void add_cutoff();
    void add_hub();
    void add_pi_mode();
    void add_window();
    void add_harmonic_edge(const std::string& none);
    void add_efficiency();
    void add_currents();
    void add_measures();

    const Chart& c_;
    const char* section_ = "";
    std::vector<ChartRow> rows_;
};

void Rows::add_point() {
    section_ = "Point";
    add("anode_voltage_V", "anode voltage", "V", 1, c_.voltage, "", kNoSource, kNotInSweep);
    add("field_mT", "magnetic field", "mT", 1e3, c_.field,
        c_.field_from_table ? "mean of the field table over the gap's area" : "", kNoSource, kNotInSweep);
    add("cathode_radius_mm", "cathode radius", "mm", 1e3, c_.cathode_radius, "", kNoSource, kNotInSweep);
    add("anode_radius_mm", "anode radius", "mm", 1e3, c_.anode_radius, "to the vane tips", kNoSource, kNotInSweep);
    add("axial_height_mm", "axial height", "mm", 1e3, c_.height, "", kNoSource, kNotInSweep);
}

void Rows::add_cutoff() {
    section_ = "Cutoff";
    const bool no_field = c_.field == 0;
    const double share = c_.voltage / c_.hull_voltage.value;
    add("cyclotron_frequency_GHz", "cyclotron frequency", "GHz", 1e-9, no_field ? kUnknown : c_.cyclotron_frequency,
        no_field ? "no magnetic field" : "e B / (2 pi m)", kLorentz);
    add("hull_voltage_V", "Hull voltage", "V", 1, c_.hull_voltage,
        no_field        ? "no magnetic field: any voltage reaches the anode"
        : c_.above_hull ? "exceeded: electrons cross without spokes"
                        : fmt::format("the anode voltage is {:.1f} % of it", 100 * share),
        kHull);
    add("hull_field_mT", "Hull field at the anode voltage", "mT", 1e3, c_.hull_field,
        no_field ? "no magnetic field"
                 : fmt::format("the field is {:.3g} times as strong", c_.field / c_.hull_field.value),
        kHull);
}

void Rows::add_hub() {
    section_ = "Brillouin hub at the point";
    const std::string none = c_.field == 0 ? "no magnetic field: no hub" : "above the Hull voltage: no hub";
    const double turns = c_.hub_speed.value / c_.hub_radius.value / (2 * kPi * c_.pi.frequency / c_.pi.mode);
    const double share = (c_.hub_radius.value - c_.cathode_radius) / (c_.anode_radius - c_.cathode_radius);
    add("hub_radius_mm", "hub radius", "mm", 1e3, c_.hub_radius,
        c_.above_hull ? none : fmt::format("the hub fills {:.1f} % of the gap", 100 * share), kBrillouin);
    add("hub_speed_m_per_s", "drift at the hub's edge", "m/s", 1, c_.hub_speed,
        c_.above_hull           ? none
        : c_.no_pi_mode.empty() ? fmt::format("turns {:.2f} times as fast as the wave", turns)
                                : "",
        kBrillouin);
    add("hub_charge_nC", "charge of the hub", "nC", 1e9, c_.hub_charge,
        c_.above_hull ? none : "over the axial height; negative", kBrillouin);
}

void Rows::add_pi_mode() {
    section_ = "Pi mode: normal form";
    add("pi_frequency_GHz", "cold frequency", "GHz", 1e-9, c_.pi.frequency, with_pi(wave_name(c_.pi)), kNoSource,
        kNotInSweep);
    add("v0_V", "V0, synchronous voltage", "V", 1, c_.pi.synchronous_voltage,
        with_pi(fmt::format("V / V0 = {:.3g}", c_.voltage / c_.pi.synchronous_voltage.value)), kNormalForm);
    add("b0_mT", "B0, synchronous field", "mT", 1e3, c_.pi.synchronous_field,
        with_pi(fmt::format("B / B0 = {:.3g}", c_.field / c_.pi.synchronous_field.value)), kNormalForm);
}

/// What stands at the upper edge.
std::string limit_name(const VoltageWindow& window) {
    if (window.limiting_mode == 0) return "Hull voltage";
    if (window.limiting_harmonic == window.limiting_mode) {
        return fmt::format("Hartree voltage of mode {}", window.limiting_mode);
    }
    return fmt::format("Hartree voltage of mode {}, m = {}", window.limiting_mode, window.limiting_harmonic);
}

void Rows::add_window() {
    section_ = "Anode voltages at which only the pi mode can start";
    std::string none = c_.no_pi_mode;
    if (none.empty() && c_.field == 0) none = "no magnetic field: no threshold";
    if (none.empty() && std::isnan(c_.window.low)) none = "B is below B0: no electron keeps step with the pi mode";
    add("hartree_voltage_V", "lower edge: Hartree, pi mode", "V", 1, c_.pi.hartree_voltage, none, kNormalForm);
    const bool shared = none.empty() && !c_.window.below.empty();
    if (shared) none = "none: other modes start lower: " + list_of(c_.window.below);
    const auto share = [&](double volts) { return none.empty() ? 100 * volts / c_.voltage : kUnknown; };
    const double fall = share(c_.voltage - c_.window.low);
    const double rise = share(c_.window.high - c_.voltage);
    add("window_high_V", "upper edge", "V", 1, none.empty() ? c_.window.high : kUnknown,
        none.empty() ? limit_name(c_.window) : none, kNormalForm);
    add("window_fall_percent", "the voltage may fall by", "%", 1, fall,
        !none.empty() ? none
        : fall < 0    ? "below the window: raise the voltage"
                      : "of itself, to the lower edge",
        kNoSource);
    add("window_rise_percent", "the voltage may rise by", "%", 1, rise,
        !none.empty() ? none
        : rise < 0    ? "above the window: lower the voltage"
                      : "of itself, to the upper edge",
        kNoSource);
    add_harmonic_edge(none);
}

void Rows::add_harmonic_edge(const std::string& none) {
    const VoltageWindow& window = c_.harmonic_window;
    add("harmonic_high_V", "upper edge, space harmonics too", "V", 1, none.empty() ? window.high : kUnknown,
        none.empty() ? limit_name(window) : none, kNormalForm);
    add("harmonic_rise_percent", "the voltage may then rise by", "%", 1,
        none.empty() ? 100 * (window.high - c_.voltage) / c_.voltage : kUnknown,
        !none.empty()          ? none
        : window.below.empty() ? ""
                               : "at or below the lower edge: " + list_of(window.below),
        kNoSource);
}

void Rows::add_efficiency() {
    section_ = "Efficiency in the pi mode";
    const std::string low = "the anode voltage is too low for it";
    const auto bound = [&](const char* key, const char* label, const ChartValue& value, const char* note) {
        add(key, label, "%", 100, value, with_pi(std::isnan(value.value) ? low : note), kNormalForm);
    };
    bound("drift_bound_percent", "electronic, drift only", c_.drift_bound, "1 - V0 / V: never more than this");
    bound("cycloid_bound_percent", "electronic, mean cycloid", c_.cycloid_bound, "1 - 2 V0 / V");
    add("circuit_efficiency_percent", "of the circuit", "%", 100, c_.circuit_efficiency,
        with_pi("Q_L / Q_ext in the deck's load"), kOutput);
    bound("total_bound_percent", "in total, drift only", {c_.total_bound, c_.total_bound}, "drift only times circuit");
    add("loaded_Q", "loaded Q", "", 1, c_.loaded_q, with_pi("in the deck's load"), kOutput);
    add("pulling_figure_MHz", "pulling figure", "MHz", 1e-6, c_.pulling_figure, with_pi("VSWR 1.5, all phases"),
        kOutput);
}

void Rows::add_currents() {
    section_ = "Currents";
    add("limited_current_A", "space-charge limit without field", "A", 1, c_.limited_current,
        "a diode at the anode voltage", kLimited);
    const bool cut_off = c_.expected_current == 0;
    add("expected_current_A", "anode current expected", "A", 1, c_.expected_current,
        c_.above_hull ? "the field does not hold the electrons"
        : cut_off     ? "cut off, and no mode carries current"
                      : fmt::format("{:.0f} % of the hub a period, roughly", 100 * kHubShareAPeriod),
        c_.above_hull || cut_off ? kNoSource : kOwnRule);
    const bool endless = std::isinf(c_.cathode_supply);
    std::string note = endless ? "no limit: emission = space_charge"
                       : cut_off
                           ? ""
                           : fmt::format("{:.3g} times the current expected", c_.cathode_supply / c_.expected_current);
    if (!endless && c_.secondary_emission) note += note.empty() ? "secondaries add to it" : "; secondaries add to it";
    add("cathode_supply_A", "primary emission of cathode", "A", 1, endless ? kUnknown : c_.cathode_supply,
        std::move(note), endless ? kNoSource : kDushman);
}

void Rows::add_measures() {
    section_ = "How far the model's assumptions hold";
    add("electrical_radius", "omega r_a / c, pi mode", "", 1, c_.electrical_radius,
        with_pi(fmt::format("static fields off by about {:.2g} %",
                            100 * static_field_error(c_.electrical_radius, c_.pi.mode))),
        kStatic);
    add("wave_beta", "pi wave at r_a, v / c", "", 1, c_.wave_beta, with_pi(""), kNoSource);
    add("electron_beta", "electron at full voltage, v / c", "", 1, c_.electron_beta, "", kNoSource);
    add("electron_gamma", "electron at full voltage, gamma", "", 1, c_.electron_gamma, "", kNoSource);
}

}  // namespace

std::string figure(double value) {
    const double size = std::abs(value);
    if (std::isnan(value)) return "-";
    return size >= 99999.5 && size < 9999999.5 ? fmt::format("{:.0f}", value) : fmt::format("{:.5g}", value);
}

double nonrelativistic_worth_showing(const ChartValue& value) {
    const bool differs = std::abs(value.nonrelativistic - value.value) > kWorthShowing * std::abs(value.value);
    return differs ? value.nonrelativistic : kUnknown;
}

std::vector<ChartRow> chart_rows(const Chart& chart) {
    return Rows(chart).all();
}

const std::vector<std::string>& chart_sources() {
    static const std::vector<std::string> sources = {
        "S. Y. Liao, Microwave Devices and Circuits, example 10-1-1",
        "A. W. Hull, Phys. Rev. 18, 31 (1921); relativistic: R. V. Lovelace & E. Ott, Phys. Fluids 17, 1263 (1974)",
        "L. Brillouin, Phys. Rev. 67, 260 (1945); relativistic: R. C. Davidson, Physics of Nonneutral Plasmas (1990)",
        "I. Langmuir & K. B. Blodgett, Phys. Rev. 22, 347 (1923); relativistic: its Poisson equation, as H. Jory & A. "
        "Trivelpiece, J. Appl. Phys. 40, 3924 (1969)",
        "J. C. Slater; A. M. Clogston in G. B. Collins (ed.), Microwave Magnetrons (1948); relativistic: Y. Y. Lau et "
        "al., Phys. Plasmas 17, 033102 (2010)",
        "S. Y. Liao, as [1], example 10-1-1A (Q); G. B. Collins (ed.), as [5] (pulling)",
        "S. Dushman, Rev. Mod. Phys. 2, 381 (1930), or the deck's emission limit",
        "M. Abramowitz & I. A. Stegun, Handbook of Mathematical Functions, 9.1.10",
        "an estimate from trial runs of this model, no published source"};
    return sources;
}

}  // namespace spokewright
