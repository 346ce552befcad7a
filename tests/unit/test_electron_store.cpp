// SPDX-License-Identifier: MIT
#include <doctest/doctest.h>

#include <algorithm>
#include <numeric>
#include <random>
#include <vector>

#include "pic/electron_store.hpp"

using namespace spokewright;

namespace {

using Names = std::vector<std::uint32_t>;

/// Electron number k: four different values that tell k and their own place.
Electron electron(std::uint32_t k) {
    const auto base = static_cast<std::int32_t>(10 * k);
    return {base, base + 1, static_cast<float>(base + 2), static_cast<float>(base + 3)};
}

ElectronStore store_of(std::uint32_t count) {
    ElectronStore store;
    for (std::uint32_t k = 0; k < count; ++k) store.append(electron(k));
    return store;
}

/// Numbers of the electrons in the store, in order; each must still be in one piece.
Names names(const ElectronStore& store) {
    Names found;
    for (std::size_t p = 0; p < store.size(); ++p) {
        const Electron at = store.at(p);
        CHECK(at.theta == at.r + 1);
        CHECK(at.u_r == static_cast<float>(at.r + 2));
        CHECK(at.u_theta == static_cast<float>(at.r + 3));
        found.push_back(static_cast<std::uint32_t>(at.r / 10));
    }
    CHECK(store.theta.size() == store.size());
    CHECK(store.u_r.size() == store.size());
    CHECK(store.u_theta.size() == store.size());
    return found;
}

Names left_of(std::uint32_t count, const Names& holes) {
    ElectronStore store = store_of(count);
    store.remove(holes);
    return names(store);
}

/// The documented order, hole by hole from the last one down.
Names one_by_one(std::uint32_t count, const Names& holes) {
    Names left(count);
    std::iota(left.begin(), left.end(), 0u);
    for (auto hole = holes.rbegin(); hole != holes.rend(); ++hole) {
        left[*hole] = left.back();
        left.pop_back();
    }
    return left;
}

}  // namespace

TEST_CASE("electrons come back in the order they were appended") {
    CHECK(names(store_of(0)).empty());
    CHECK(names(store_of(5)) == Names{0, 1, 2, 3, 4});
}

TEST_CASE("room changes nothing, a size cuts or fills up with electrons at rest on the cathode") {
    ElectronStore store = store_of(3);
    store.reserve(1000);
    CHECK(names(store) == Names{0, 1, 2});
    CHECK(store.u_theta.capacity() >= 1000);
    store.resize(2);
    CHECK(names(store) == Names{0, 1});
    store.resize(4);
    CHECK(store.size() == 4);
    CHECK(store.at(1).u_theta == electron(1).u_theta);
    const Electron added = store.at(3);
    CHECK(added.r == 0);
    CHECK(added.theta == 0);
    CHECK(added.u_r == 0);
    CHECK(added.u_theta == 0);
}

TEST_CASE("removal of none, of all, and from an empty store") {
    CHECK(left_of(4, {}) == Names{0, 1, 2, 3});
    CHECK(left_of(4, {0, 1, 2, 3}).empty());
    CHECK(left_of(1, {0}).empty());
    CHECK(left_of(0, {}).empty());
}

TEST_CASE("a hole takes the last electron") {
    CHECK(left_of(6, {0}) == Names{5, 1, 2, 3, 4});
    CHECK(left_of(6, {5}) == Names{0, 1, 2, 3, 4});
    CHECK(left_of(6, {2, 3}) == Names{0, 1, 4, 5});        // neighbours
    CHECK(left_of(6, {4, 5}) == Names{0, 1, 2, 3});        // only the tail
    CHECK(left_of(6, {1, 5}) == Names{0, 4, 2, 3});        // the tail is a hole itself
    CHECK(left_of(6, {0, 4}) == Names{5, 1, 2, 3});        // 5 fills 4 and moves on to 0
    CHECK(left_of(8, {1, 3, 6}) == Names{0, 5, 2, 7, 4});  // 7 fills 6 and moves on to 3
}

TEST_CASE("whatever is removed, the others stay, each once, in the documented order") {
    std::mt19937 random(3);
    for (const std::uint32_t count : {1u, 2u, 17u, 64u}) {
        for (int trial = 0; trial < 50; ++trial) {
            Names holes;
            const auto tenths = random() % 11;
            for (std::uint32_t k = 0; k < count; ++k) {
                if (random() % 10 < tenths) holes.push_back(k);
            }
            Names left = left_of(count, holes);
            CHECK(left == one_by_one(count, holes));
            left.insert(left.end(), holes.begin(), holes.end());
            std::sort(left.begin(), left.end());
            CHECK(left == one_by_one(count, {}));
        }
    }
}
