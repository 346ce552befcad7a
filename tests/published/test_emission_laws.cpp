// SPDX-License-Identifier: MIT
// Source: S. Dushman, Rev. Mod. Phys. 2, 381 (1930) and S. Dushman & J. W. Ewald, Phys. Rev. 29, 857 (1927) (heat);
// J. R. M. Vaughan, IEEE Trans. Electron Devices 36, 1963 (1989) and 40, 830 (1993) (impact).
#include <doctest/doctest.h>
#include <fmt/format.h>

#include "diagnostics/cathode_laws.hpp"
#include "tests/published_row.hpp"

using namespace spokewright;

TEST_CASE("thermionic current of tungsten and of thoriated tungsten") {
    struct Entry {
        const char* metal;
        double constant;  // A/(m^2 K^2)
        double work_function, temperature, printed;
    };
    for (const Entry& entry :
         {Entry{"tungsten", 60.2e4, 4.52, 2500, 2908}, Entry{"thoriated tungsten", 3.0e4, 2.63, 1900, 1.144e4},
          Entry{"thoriated tungsten", 3.0e4, 2.63, 2000, 2.831e4}}) {
        check_published({fmt::format("thermionic current of {} at {} K, A/m^2", entry.metal, entry.temperature),
                         "S. Dushman, Rev. Mod. Phys. 2, 381 (1930) (from memory)", entry.printed,
                         thermionic_current_density(entry.constant, entry.temperature, entry.work_function, 0), 3e-4,
                         "printed with four figures"});
    }
}

TEST_CASE("secondary yield of a surface with delta_max 1.4 at 650 eV") {
    const SecondarySurface surface{1.4, 650, 1};
    const double energy[] = {50, 100, 200, 650, 1000, 3000};
    const double yield[] = {0.4853, 0.7464, 1.0475, 1.4, 1.3615, 0.9173};
    for (int k = 0; k < 6; ++k) {
        check_published({fmt::format("secondary yield at {} eV", energy[k]), "J. R. M. Vaughan (1989, 1993), computed",
                         yield[k], secondary_yield(surface, energy[k], 0), 1.1e-4, "printed with four figures"});
    }
}
