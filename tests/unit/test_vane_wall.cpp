// SPDX-License-Identifier: MIT
// Source: sums of cosines over a full turn: sum_i (cos(n th_i) - cos(n th_{i+1}))^2 = 2 N sin^2(pi n / N) for
// 0 < n < N/2, the same for sines; 4 N for the pi mode (derived).
#include <doctest/doctest.h>

#include <cmath>
#include <utility>
#include <vector>

#include "fields/vane_wall.hpp"
#include "inputs/constants.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

constexpr double kRounding = 1e-12;  // sums of at most 60 terms
const std::vector<double> kVanes{1, -2, 5, 3, -7, 4};
constexpr double kGap = 0.4;

/// Angle of a place counted in pitches from the middle of vane 0.
double at_pitch(double pitches) {
    return 2 * kPi * pitches / static_cast<double>(kVanes.size());
}

double product(const std::vector<double>& a, const std::vector<double>& b) {
    double sum = 0;
    for (std::size_t i = 0; i < a.size(); ++i) sum += a[i] * b[i];
    return sum;
}

}  // namespace

TEST_CASE("the wall has each vane's value all over its tip") {
    const VaneWall wall(6, kGap);
    for (int i = 0; i < 6; ++i) {
        for (const double place : {-0.2999, -0.1, 0.0, 0.2, 0.2999}) {
            const double pitches = i + place < 0 ? i + place + 6 : i + place;  // angles lie in one turn
            CHECK(wall.profile(kVanes, at_pitch(pitches)) == kVanes[static_cast<std::size_t>(i)]);
        }
    }
}

TEST_CASE("across a gap the wall goes linearly from one vane to the next, also over the turn's end") {
    const VaneWall wall(6, kGap);
    for (std::size_t i = 0; i < 6; ++i) {
        const double left = kVanes[i], right = kVanes[(i + 1) % 6];
        for (const double share : {0.0, 0.25, 0.5, 0.9, 1.0}) {
            const double found = wall.profile(kVanes, at_pitch(static_cast<double>(i) + 0.3 + share * kGap));
            CHECK(std::abs(found - (left + share * (right - left))) < kRounding);
        }
    }
}

TEST_CASE("the wall is continuous") {
    for (const double gap : {0.1, 0.4, 0.9}) {
        const VaneWall wall(6, gap);
        const std::vector<double> values = wall.profile_at_nodes(kVanes, 6000);
        for (std::size_t j = 0; j < values.size(); ++j) {
            const double jump = std::abs(values[(j + 1) % values.size()] - values[j]);
            CHECK(jump <= 11 / (gap * 1000) + kRounding);  // 11 V at most from vane to vane, 1000 nodes a pitch
        }
    }
}

TEST_CASE("node j of the wall is the profile at angle 2 pi j / n") {
    const VaneWall wall(6, kGap);
    const std::vector<double> nodes = wall.profile_at_nodes(kVanes, 96);
    REQUIRE(nodes.size() == 96);
    for (std::size_t j = 0; j < 96; ++j) {
        CHECK(nodes[j] == wall.profile(kVanes, 2 * kPi * static_cast<double>(j) / 96));
    }
    CHECK(nodes[0] == 1);
    CHECK(nodes[16] == -2);
}

TEST_CASE("a full turn is the same place as none") {
    const VaneWall wall(6, kGap);
    CHECK(wall.profile(kVanes, 2 * kPi) == wall.profile(kVanes, 0));
    CHECK(wall.sector(2 * kPi) == wall.sector(0));
}

TEST_CASE("a mode below pi has a cosine and a sine pattern, the pi mode one that alternates") {
    for (const int n : {1, 2, 3, 4}) {
        const auto patterns = vane_patterns(10, n);
        REQUIRE(patterns.size() == 2);
        CHECK(patterns[0].standing == Standing::cosine);
        CHECK(patterns[1].standing == Standing::sine);
        for (std::size_t i = 0; i < 10; ++i) {
            const double phase = 2 * kPi * n * static_cast<double>(i) / 10;
            CHECK(std::abs(patterns[0].vanes[i] - std::cos(phase)) < kRounding);
            CHECK(std::abs(patterns[1].vanes[i] - std::sin(phase)) < kRounding);
        }
        CHECK(patterns[0].mode == n);
        CHECK(patterns[1].mode == n);
    }
    const auto pi_mode = vane_patterns(10, 5);
    REQUIRE(pi_mode.size() == 1);
    CHECK(pi_mode[0].standing == Standing::alternating);
    for (std::size_t i = 0; i < 10; ++i) CHECK(std::abs(pi_mode[0].vanes[i] - (i % 2 == 0 ? 1 : -1)) < kRounding);
    CHECK(vane_patterns(11, 5).size() == 2);  // an odd block has no pi mode
}

TEST_CASE("patterns of all modes are orthogonal, with squares N / 2, or N in the pi mode") {
    for (const int vanes : {8, 11}) {
        std::vector<VanePattern> all;
        for (int n = 1; n <= vanes / 2; ++n) {
            for (VanePattern& pattern : vane_patterns(vanes, n)) all.push_back(std::move(pattern));
        }
        REQUIRE(all.size() == static_cast<std::size_t>(vanes - 1));
        for (std::size_t a = 0; a < all.size(); ++a) {
            for (std::size_t b = 0; b < all.size(); ++b) {
                const double square = all[a].standing == Standing::alternating ? vanes : 0.5 * vanes;
                CHECK(std::abs(product(all[a].vanes, all[b].vanes) - (a == b ? square : 0)) < kRounding);
            }
        }
    }
}

TEST_CASE("on the wall the cosine patterns are even and the sine patterns odd in theta") {
    const VaneWall wall(10, kGap);
    for (int n = 1; n <= 5; ++n) {
        for (const VanePattern& pattern : vane_patterns(10, n)) {
            const std::vector<double> nodes = wall.profile_at_nodes(pattern.vanes, 150);
            const double sign = pattern.standing == Standing::sine ? -1 : 1;
            for (std::size_t j = 1; j < 150; ++j) CHECK(std::abs(nodes[150 - j] - sign * nodes[j]) < kRounding);
        }
    }
}

TEST_CASE("gap square sum: 2 N sin^2(pi n / N), and 4 N in the pi mode") {
    for (const int vanes : {4, 10, 11, 60}) {
        for (int n = 1; n <= vanes / 2; ++n) {
            const double sine = std::sin(kPi * n / vanes);
            const double expected = 2 * n == vanes ? 4 * vanes : 2 * vanes * sine * sine;
            for (const VanePattern& pattern : vane_patterns(vanes, n)) {
                CHECK(relative_error(gap_square_sum(pattern), expected) < kRounding);
            }
        }
    }
}

TEST_CASE("sectors: vane i is 2 i on both sides of its middle, the slot after it 2 i + 1") {
    for (const double gap : {0.1, 0.4, 0.9}) {
        const VaneWall wall(6, gap);
        const double half_tip = 0.5 * (1 - gap), near = 1e-9;
        for (int i = 0; i < 6; ++i) {
            CHECK(wall.sector(at_pitch(i)) == 2 * i);
            CHECK(wall.sector(at_pitch(i + half_tip - near)) == 2 * i);
            CHECK(wall.sector(at_pitch(i + half_tip + near)) == 2 * i + 1);
            CHECK(wall.sector(at_pitch(i + 0.5)) == 2 * i + 1);
            CHECK(wall.sector(at_pitch(i + 1 - half_tip - near)) == 2 * i + 1);
            CHECK(wall.sector(at_pitch(i + 1 - half_tip + near)) == (2 * i + 2) % 12);
        }
    }
}

TEST_CASE("sectors over the turn's end: the last half of vane 0 lies just below 2 pi") {
    const VaneWall wall(6, kGap);
    CHECK(wall.sector(0) == 0);
    CHECK(wall.sector(std::nextafter(2 * kPi, 0)) == 0);
    CHECK(wall.sector(at_pitch(5.71)) == 0);
    CHECK(wall.sector(at_pitch(5.69)) == 11);
}

TEST_CASE("sectors take their share of the turn") {
    const VaneWall wall(6, 0.3);
    std::vector<int> count(12, 0);
    for (int k = 0; k < 6000; ++k) ++count[static_cast<std::size_t>(wall.sector(at_pitch((k + 0.5) / 1000)))];
    for (std::size_t s = 0; s < 12; ++s) CHECK(std::abs(count[s] - (s % 2 == 0 ? 700 : 300)) <= 1);
}
