// SPDX-License-Identifier: MIT
#include "inputs/deck_keys.hpp"

#include "inputs/constants.hpp"
#include "inputs/deck_rules.hpp"
#include "inputs/deck_values.hpp"
#include "inputs/text_file.hpp"

namespace spokewright {

namespace {

constexpr Unit kMillimetre{"mm", 1e-3};
constexpr Unit kVolt{"V", 1};
constexpr Unit kNanosecond{"ns", 1e-9};
constexpr Unit kPicosecond{"ps", 1e-12};
constexpr Unit kMinute{"min", 60};
constexpr Unit kPercent{"%", 0.01};
constexpr Unit kOhm{"ohm", 1};
constexpr Unit kPicofarad{"pF", 1e-12};
constexpr Unit kAmpere{"A", 1};
constexpr Unit kTesla{"T", 1};
constexpr Unit kKelvin{"K", 1};
constexpr Unit kElectronVolt{"eV", 1};
constexpr Unit kAmperePerSquareCentimetre{"A/cm^2", 1e4};
constexpr Unit kRichardson{"A/(cm^2 K^2)", 1e4};
constexpr Unit kWatt{"W", 1};
constexpr Unit kGigahertz{"GHz", 1e9};
constexpr Unit kDegree{"deg", kPi / 180};

using ReadValue = std::function<void(Deck&, std::string_view)>;
using CheckDeck = void (*)(const Deck&);

// One number of a section, checked against its range and then, if asked, against the keys above.
template <typename Section>
KeyValue real(Section Deck::*part, double Section::*member, Unit unit, Range range, CheckDeck check = nullptr) {
    return {unit.name, range_text(range, unit), [=](Deck& deck, std::string_view text) {
                deck.*part.*member = read_real(text, range, unit) * unit.to_si;
                if (check != nullptr) check(deck);
            }};
}

template <typename Section, typename Integer>
KeyValue whole(Section Deck::*part, Integer Section::*member, Integer low, Integer high) {
    return {"", std::to_string(low) + ".." + std::to_string(high), [=](Deck& deck, std::string_view text) {
                deck.*part.*member = static_cast<Integer>(read_integer(text, low, high));
            }};
}

template <typename Section>
KeyValue yes_no(Section Deck::*part, bool Section::*member) {
    return {"", "yes, no", [=](Deck& deck, std::string_view text) {
                deck.*part.*member = read_choice(text, {"yes", "no"}) == 0;
            }};
}

// One value for each mode of mode_numbers, or one for all.
KeyValue mode_list(double ModeEntry::*member, Unit unit, Range range) {
    return {unit.name, range_text(range, unit), [=](Deck& deck, std::string_view text) {
                if (deck.circuit.source == CircuitSource::none) return;
                std::vector<ModeEntry>& modes = deck.circuit.modes;
                const std::vector<std::string_view> items = list_items(text);
                if (items.size() != 1 && items.size() != modes.size()) {
                    throw BadValue(std::to_string(items.size()) + " values for " + std::to_string(modes.size()) +
                                   " modes; allowed: one value for each of mode_numbers, or one for all");
                }
                for (std::size_t i = 0; i < modes.size(); ++i) {
                    modes[i].*member = read_real(items[items.size() == 1 ? 0 : i], range, unit) * unit.to_si;
                }
            }};
}

KeyValue text_of(std::string unit, std::string range, ReadValue read) {
    return {std::move(unit), std::move(range), std::move(read)};
}

KeyDefault required() {
    return {"required", {}};
}

KeyDefault preset(const std::string& text) {
    return {text, [text](const Deck&) { return std::optional(text); }};
}

KeyDefault computed(std::string shown, std::string (*text)(const Deck&)) {
    return {std::move(shown), [text](const Deck& deck) { return std::optional(text(deck)); }};
}

KeyDefault with_circuit() {
    return {"required with source = table", [](const Deck& deck) -> std::optional<std::string> {
                if (deck.circuit.source == CircuitSource::none) return std::nullopt;
                throw BadValue("missing; needed with circuit.source = table: a value for each mode");
            }};
}

KeyDefault without_field_table() {
    return {"required without field_table", [](const Deck& deck) -> std::optional<std::string> {
                if (!deck.magnet.table.empty()) return std::nullopt;
                throw BadValue("missing; allowed: field_T, 0..10 T, or field_table");
            }};
}

KeyDefault absent() {
    return {"none", [](const Deck&) -> std::optional<std::string> { return std::nullopt; }};
}

void read_name(Deck& deck, std::string_view text) {
    if (text.empty() || text.size() > 80) throw BadValue("the name has the wrong length; allowed: 1..80 bytes");
    deck.tube.name = text;
}

void read_rise_time(Deck& deck, std::string_view text) {
    const double rise = read_real(text, between(0, 1e6), kNanosecond) * kNanosecond.to_si;
    deck.supply.programme = {{0, rise > 0 ? 0.0 : 1.0}, {rise, 1}};
}

void read_emission(Deck& deck, std::string_view text) {
    const bool limited = read_choice(text, {"space_charge", "thermionic"}) == 0;
    deck.cathode.emission = limited ? EmissionLaw::space_charge : EmissionLaw::thermionic;
}

void append(std::vector<DeckKey>& keys, std::vector<DeckKey> section) {
    for (DeckKey& key : section) keys.push_back(std::move(key));
}

std::vector<DeckKey> tube_keys() {
    const auto part = &Deck::tube;
    using S = TubeSettings;
    return {
        {"tube", "name", text_of("", "text, 1..80 bytes", read_name), preset("unnamed tube"),
         "Name of the tube, for headings.", ""},
        {"tube", "cathode_radius_mm", real(part, &S::cathode_radius, kMillimetre, above(0, 1000)), required(),
         "Radius of the emitting cathode surface.", ""},
        {"tube", "anode_radius_mm",
         real(part, &S::anode_radius, kMillimetre, above(0, 1000), require_anode_outside_cathode), required(),
         "Radius of the bore, to the vane tips.", ""},
        {"tube", "axial_height_mm", real(part, &S::axial_height, kMillimetre, above(0, 1000)), required(),
         "Axial height of the interaction space.", ""},
        {"tube", "vane_count", text_of("", "0 or 4..60", read_vane_count), required(),
         "Number of vanes; 0 is a smooth bore.", ""},
        {"tube", "gap_share", real(part, &S::gap_share, kNoUnit, between(0.1, 0.9)), preset("0.4"),
         "Gap between vane tips as a share of the vane pitch.", ""},
    };
}

std::vector<DeckKey> supply_keys() {
    const auto part = &Deck::supply;
    using S = SupplySettings;
    return {
        {"supply", "anode_voltage_V", real(part, &S::anode_voltage, kVolt, above(0, 1e6)), required(),
         "Nominal anode voltage; the programme scales it.", ""},
        {"supply", "rise_time_ns", text_of("ns", "0..1e+06 ns", read_rise_time), preset("5"),
         "Time in which the voltage rises from zero; not beside a programme.", ""},
        {"supply", "programme", text_of("ns:share", "times 0..1e+06 ns, rising; shares 0..2", read_programme),
         computed("0:0 rise_time_ns:1", programme_text),
         "Voltage over time: pairs time_ns:share of the anode voltage, straight lines between, held at the ends.",
         "rise_time_ns"},
        {"supply", "series_resistance_ohm", real(part, &S::series_resistance, kOhm, between(0, 1e9)), preset("0"),
         "Resistance between supply and anode; 0 is an ideal supply.", ""},
        {"supply", "shunt_capacitance_pF", real(part, &S::shunt_capacitance, kPicofarad, between(0, 1e9)), preset("0"),
         "Capacitance from anode to cathode beside the tube's own.", ""},
        {"supply", "regulated_current_A", real(part, &S::regulated_current, kAmpere, between(0, 1e5)), preset("0"),
         "Mean anode current held within the programme's voltage; 0 is a voltage supply.", ""},
    };
}

std::vector<DeckKey> magnet_keys() {
    const auto part = &Deck::magnet;
    using S = MagnetSettings;
    return {
        {"magnet", "field_table",
         text_of("mm, T", "a file with columns r_mm B_T, from cathode to anode", read_field_table_key), absent(),
         "File of the axial field over radius, named from the deck's folder.", ""},
        {"magnet", "field_T", real(part, &S::field, kTesla, between(0, 10)), without_field_table(),
         "Uniform axial field; not beside field_table.", "field_table"},
        {"magnet", "field_scale", real(part, &S::field_scale, kNoUnit, between(0, 10)), preset("1"),
         "Factor on the field, uniform or from the table.", ""},
        {"magnet", "self_field", yes_no(part, &S::self_field), preset("no"),
         "Add the field of the electrons' own azimuthal current.", ""},
    };
}

std::vector<DeckKey> cathode_keys() {
    const auto part = &Deck::cathode;
    using S = CathodeSettings;
    return {
        {"cathode", "emission", text_of("", "space_charge, thermionic", read_emission), preset("space_charge"),
         "What limits the primary emission: the space charge, or the temperature of the cathode.", ""},
        {"cathode", "temperature_K", real(part, &S::temperature, kKelvin, between(1, 4000)), preset("1900"),
         "Cathode temperature.", ""},
        {"cathode", "work_function_eV", real(part, &S::work_function, kElectronVolt, between(0.1, 10)), preset("2.63"),
         "Work function, for thermionic emission.", ""},
        {"cathode", "richardson_A_per_cm2_K2", real(part, &S::richardson_constant, kRichardson, above(0, 1000)),
         preset("3.0"), "Richardson constant, for thermionic emission.", ""},
        {"cathode", "emission_limit_A_per_cm2",
         real(part, &S::emission_limit, kAmperePerSquareCentimetre, between(0, 1e6)), preset("0"),
         "Cap on the primary emission; 0 is none.", ""},
        {"cathode", "launch_temperature_eV", real(part, &S::launch_temperature, kElectronVolt, between(0, 100)),
         computed("kT of temperature_K", thermal_energy_text), "Temperature of the electrons as they leave.", ""},
        {"cathode", "secondary_emission", yes_no(part, &S::secondary_emission), preset("no"),
         "Electrons that return to the cathode release others.", ""},
        {"cathode", "secondary_yield_max", real(part, &S::secondary_yield_max, kNoUnit, between(0, 20)), preset("1.4"),
         "Largest secondary yield at normal incidence.", ""},
        {"cathode", "secondary_energy_max_eV", real(part, &S::secondary_energy_max, kElectronVolt, between(20, 1e4)),
         preset("650"), "Impact energy of the largest secondary yield.", ""},
        {"cathode", "secondary_roughness", real(part, &S::secondary_roughness, kNoUnit, between(0, 2)), preset("1"),
         "Growth of the yield at grazing incidence: 0 rough, 1 dull, 2 polished.", ""},
        {"cathode", "secondary_temperature_eV", real(part, &S::secondary_temperature, kElectronVolt, between(0, 100)),
         preset("2"), "Temperature of the secondaries as they leave.", ""},
    };
}

std::vector<DeckKey> circuit_keys() {
    return {
        {"circuit", "source", text_of("", "none, table", read_circuit_source), preset("none"),
         "Where the resonator data come from; none is a wall at the anode voltage.", ""},
        {"circuit", "mode_numbers", text_of("", "1..N/2, each once", read_mode_numbers), with_circuit(),
         "Azimuthal mode numbers, a list; N/2 is the pi mode.", ""},
        {"circuit", "frequencies_GHz", mode_list(&ModeEntry::frequency, kGigahertz, above(0, 1000)), with_circuit(),
         "Cold frequency of each mode.", ""},
        {"circuit", "unloaded_Q", mode_list(&ModeEntry::unloaded_q, kNoUnit, above(0, 1e9)), with_circuit(),
         "Quality factor of each mode by its wall losses alone.", ""},
        {"circuit", "external_Q", mode_list(&ModeEntry::external_q, kNoUnit, above(0, 1e9)), with_circuit(),
         "Quality factor of each mode by a matched load alone.", ""},
        {"circuit", "capacitance_pF", mode_list(&ModeEntry::capacitance, kPicofarad, above(0, 1e6)), with_circuit(),
         "Capacitance of one resonator of each mode, referred to the gap voltage.", ""},
        {"load", "vswr", real(&Deck::load, &LoadSettings::vswr, kNoUnit, between(1, 1000)), preset("1"),
         "Standing-wave ratio of the load; 1 is matched.", ""},
        {"load", "phase_deg", real(&Deck::load, &LoadSettings::phase, kDegree, between(-360, 360)), preset("0"),
         "Phase of the load's reflection coefficient.", ""},
        {"prime", "mode", text_of("", "1..N/2, 0 the pi mode", read_prime_mode), computed("N/2", pi_mode_text),
         "Mode that starts with a voltage.", ""},
        {"prime", "voltage_V", real(&Deck::prime, &PrimeSettings::voltage, kVolt, between(0, 1e6), require_primed_mode),
         preset("0"), "Starting vane voltage of that mode; 0 starts from noise.", ""},
        {"prime", "time_ns", real(&Deck::prime, &PrimeSettings::time, kNanosecond, between(0, 1e6)), preset("0"),
         "When the priming is applied.", ""},
        {"drive", "mode", text_of("", "1..N/2, 0 the pi mode", read_drive_mode), computed("N/2", pi_mode_text),
         "Mode that a generator drives through its output coupling.", ""},
        {"drive", "available_power_W",
         real(&Deck::drive, &DriveSettings::power, kWatt, between(0, 1e9), require_driven_mode), preset("0"),
         "Power that the matched generator can give; 0 is none. Wants load.vswr = 1.", ""},
        {"drive", "frequency_GHz", text_of("GHz", "within 20 % of the mode's cold frequency", read_drive_frequency),
         computed("cold frequency of the mode", drive_frequency_text), "Frequency of the generator.", ""},
        {"drive", "phase_deg", real(&Deck::drive, &DriveSettings::phase, kDegree, between(-360, 360)), preset("0"),
         "Phase of the generator at the start of the run.", ""},
        {"drive", "start_ns", real(&Deck::drive, &DriveSettings::start, kNanosecond, between(0, 1e6)), preset("0"),
         "When the generator is switched on.", ""},
    };
}

std::vector<DeckKey> run_keys() {
    return {
        {"grid", "radial_cells", text_of("", "8..120", read_radial_cells), preset("48"), "Cells from cathode to anode.",
         ""},
        {"grid", "azimuthal_cells", text_of("", "8..504, a multiple of vane_count", read_azimuthal_cells),
         computed("16 a vane, 64 in a smooth bore", azimuthal_cells_text), "Cells around the tube.", ""},
        {"clock", "step_ps", real(&Deck::clock, &ClockSettings::step, kPicosecond, above(0, 1000)),
         computed("the least of 0.1/omega_c, 1/60 of the shortest mode period, 2 radial cells at full speed",
                  step_text),
         "Time step.", ""},
        {"clock", "end_time_ns",
         real(&Deck::clock, &ClockSettings::end_time, kNanosecond, above(0, 1e6), require_reachable_end), preset("200"),
         "Tube time at which the run ends.", ""},
        {"clock", "sample_every", whole(&Deck::clock, &ClockSettings::sample_every, 1, 1000000), preset("16"),
         "Steps between two samples of the series.", ""},
        {"clock", "stop_half_width_percent",
         real(&Deck::clock, &ClockSettings::stop_half_width, kPercent, between(0, 5)), preset("0"),
         "End early once settled with current and power known to this half-width, or once a mode skip is certain; 0 "
         "runs to the end time.",
         ""},
        {"electrons", "target_count",
         whole<ElectronSettings, std::int64_t>(&Deck::electrons, &ElectronSettings::target_count, 100, 50'000'000),
         preset("20000"), "Macro-electrons in the hub at full voltage.", ""},
        {"electrons", "seed",
         text_of("", "0..18446744073709551615",
                 [](Deck& deck, std::string_view text) { deck.electrons.seed = read_unsigned(text); }),
         preset("1"), "Seed of the random numbers.", ""},
        {"output", "snapshot_times_ns", text_of("ns", "0..1e+06 ns, rising, or none", read_snapshot_times),
         preset("none"), "Tube times at which the fields and electrons are kept; the last state always is.", ""},
        {"output", "checkpoint_minutes",
         real(&Deck::output, &OutputSettings::checkpoint_interval, kMinute, between(0, 10000)), preset("10"),
         "Wall-clock time between two saved states; 0 saves only at the end.", ""},
    };
}

}  // namespace

const std::vector<DeckKey>& deck_keys() {
    static const std::vector<DeckKey> keys = [] {
        std::vector<DeckKey> all;
        for (const auto section : {tube_keys, supply_keys, magnet_keys, cathode_keys, circuit_keys, run_keys}) {
            append(all, section());
        }
        return all;
    }();
    return keys;
}

}  // namespace spokewright
