// SPDX-License-Identifier: MIT
#include "pic/particle_kernel.hpp"

#include <doctest/doctest.h>

#include <bit>
#include <limits>

#include "tests/drifting_cloud.hpp"
#include "tests/unit/edge_electrons.hpp"

using namespace spokewright;

namespace {

const DriftingCloud kCloud(48, 160, 0);
const ParticlePlan kPlan = kCloud.units.plan();
constexpr std::size_t kCounts[] = {0, 1, 7, 8, 9, 15, 16, 17, 255, 256, 257, 271, 272, 273, 1000};

template <class Work>
void with_each_vector_set(const Work& work) {
    for (const InstructionSet set : instruction_sets()) {
        if (set != InstructionSet::plain) {
            CAPTURE(name_of(set));
            work(particle_kernel(set));
        }
    }
}

// Bit by bit: NaN equals itself, 0 differs from -0.
bool same_bits(const AlignedVector<float>& a, const AlignedVector<float>& b) {
    return std::equal(a.begin(), a.end(), b.begin(), b.end(), [](float x, float y) {
        return std::bit_cast<std::uint32_t>(x) == std::bit_cast<std::uint32_t>(y);
    });
}

struct Pushed {
    ElectronStore store;
    std::vector<std::uint32_t> hits;
};

Pushed push(const ParticleKernel& kernel, ElectronStore store, std::size_t begin = 0) {
    std::vector<std::uint32_t> hits(store.size());
    hits.resize(kernel.push(kPlan, kCloud.force.cells(), store.arrays(), begin, store.size(), hits.data()));
    return {store, hits};
}

void check_same(const Pushed& a, const Pushed& b) {
    CHECK(a.store.r == b.store.r);
    CHECK(a.store.theta == b.store.theta);
    CHECK(same_bits(a.store.u_r, b.store.u_r));
    CHECK(same_bits(a.store.u_theta, b.store.u_theta));
    CHECK(a.hits == b.hits);
}

}  // namespace

TEST_CASE("the plain kernel is always there, first, and the fastest is last") {
    CHECK(instruction_sets().front() == InstructionSet::plain);
    CHECK(instruction_sets().back() == fastest_instruction_set());
    CHECK(name_of(InstructionSet::plain) == "plain");
    CHECK(name_of(InstructionSet::avx2) == "AVX2");
    CHECK(name_of(InstructionSet::avx512) == "AVX-512");
}

TEST_CASE("every instruction set pushes to the same bits, whatever the number of electrons") {
    for (const std::size_t count : kCounts) {
        CAPTURE(count);
        const ElectronStore start = edge_electrons(kCloud.units, count);
        const Pushed plain = push(particle_kernel(InstructionSet::plain), start);
        with_each_vector_set([&](const ParticleKernel& kernel) { check_same(push(kernel, start), plain); });
    }
}

TEST_CASE("a range that begins inside a vector leaves the electrons before it alone") {
    const ElectronStore start = edge_electrons(kCloud.units, 100);
    const Pushed plain = push(particle_kernel(InstructionSet::plain), start, 37);
    for (std::size_t p = 0; p < 37; ++p) {
        CHECK(plain.store.r[p] == start.r[p]);
    }
    with_each_vector_set([&](const ParticleKernel& kernel) { check_same(push(kernel, start, 37), plain); });
}

TEST_CASE("a momentum that is no number ends at the cathode on every set, and touches no other electron") {
    ElectronStore start = edge_electrons(kCloud.units, 40);
    const Pushed good = push(particle_kernel(InstructionSet::plain), start);
    start.u_r[20] = std::numeric_limits<float>::quiet_NaN();
    start.u_theta[21] = std::numeric_limits<float>::infinity();
    for (const InstructionSet set : instruction_sets()) {
        const Pushed bad = push(particle_kernel(set), start);
        for (std::size_t p = 0; p < start.size(); ++p) {
            CHECK(bad.store.theta[p] >= 0);
            CHECK(bad.store.theta[p] < kPlan.azimuthal_end);
            if (p != 20 && p != 21) CHECK(bad.store.r[p] == good.store.r[p]);
        }
    }
}

TEST_CASE("every instruction set scatters the same charge") {
    for (const std::size_t count : kCounts) {
        CAPTURE(count);
        const ElectronStore store = edge_electrons(kCloud.units, count);
        const auto scatter = [&](const ParticleKernel& kernel) {
            AlignedVector<CellCharge> cells(kCloud.units.table_cells());
            kernel.scatter(kPlan, store.view(), 0, count, cells.data());
            return cells;
        };
        const auto plain = scatter(particle_kernel(InstructionSet::plain));
        with_each_vector_set([&](const ParticleKernel& kernel) {
            const auto cells = scatter(kernel);
            for (std::size_t k = 0; k < cells.size(); ++k) {
                REQUIRE(cells[k].inner == plain[k].inner);
                REQUIRE(cells[k].inner_next == plain[k].inner_next);
                REQUIRE(cells[k].outer == plain[k].outer);
                REQUIRE(cells[k].outer_next == plain[k].outer_next);
            }
        });
    }
}

TEST_CASE("every instruction set finds the same energies and angular speeds") {
    const ElectronStore store = edge_electrons(kCloud.units, 1001);
    const std::size_t room = store.size() + kWidest;
    const auto found = [&](const ParticleKernel& kernel) {
        AlignedVector<float> all;
        {
            AlignedVector<float> energy(room), inner(room), outer(room);
            kernel.kinetic(kPlan, kCloud.force.cells(), store.view(), 0, store.size(), energy.data());
            kernel.turning(kPlan, store.view(), 0, store.size(), inner.data(), outer.data());
            for (const auto& part : {energy, inner, outer}) {
                all.insert(all.end(), part.begin(), part.begin() + static_cast<std::ptrdiff_t>(store.size()));
            }
        }
        return all;
    };
    const auto plain = found(particle_kernel(InstructionSet::plain));
    CHECK(plain[1000] != 0.0f);
    with_each_vector_set([&](const ParticleKernel& kernel) { CHECK(same_bits(found(kernel), plain)); });
}
