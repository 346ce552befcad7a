// SPDX-License-Identifier: MIT
// Sources: J. K. Salmon et al., SC11 (2011); the three philox4x32-10 lines of Random123's kat_vectors, from memory.
#include <doctest/doctest.h>

#include <cmath>
#include <initializer_list>
#include <set>
#include <vector>

#include "pic/counter_random.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

using Words = std::array<std::uint32_t, 4>;

struct KnownAnswer {
    Words counter;
    std::array<std::uint32_t, 2> key;
    Words answer;
};

const std::vector<KnownAnswer> kKnownAnswers = {
    {{0, 0, 0, 0}, {0, 0}, {0x6627e8d5, 0xe169c58d, 0xbc57ac4c, 0x9b00dbd8}},
    {{~0u, ~0u, ~0u, ~0u}, {~0u, ~0u}, {0x408f276d, 0x41c83b0e, 0xa20bc7c6, 0x6d5451fd}},
    {{0x243f6a88, 0x85a308d3, 0x13198a2e, 0x03707344},
     {0xa4093822, 0x299f31d0},
     {0xd16cfe09, 0x94fdcceb, 0x5001e420, 0x24126ea1}},
};

std::uint64_t joined(std::uint32_t low, std::uint32_t high) {
    return low | std::uint64_t{high} << 32;
}

constexpr int kBlocks = 25000;  // of four numbers

/// Every number of kBlocks blocks, in double.
std::vector<double> many_numbers() {
    const CounterRandom random(1);
    std::vector<double> numbers;
    for (int k = 0; k < kBlocks; ++k) {
        for (const float x : random.uniform(k / 100, Draw::emission, static_cast<std::uint32_t>(k % 100), 7)) {
            numbers.push_back(static_cast<double>(x));
        }
    }
    return numbers;
}

}  // namespace

TEST_CASE("Philox 4x32-10 gives the known answers") {
    for (const KnownAnswer& known : kKnownAnswers) {
        const r123::Philox4x32::ctr_type counter{
            {known.counter[0], known.counter[1], known.counter[2], known.counter[3]}};
        const r123::Philox4x32::key_type key{{known.key[0], known.key[1]}};
        const auto words = r123::Philox4x32()(counter, key);
        for (std::size_t k = 0; k < 4; ++k) CHECK(words[k] == known.answer[k]);
    }
}

TEST_CASE("a number is the middle of the interval that its word's upper 23 bits name") {
    for (const KnownAnswer& known : kKnownAnswers) {
        // The name of the counter: step in words 0 and 1, place and purpose (3 bits) in word 2, index in word 3.
        const auto step = static_cast<std::int64_t>(joined(known.counter[0], known.counter[1]));
        const CounterRandom random(joined(known.key[0], known.key[1]));
        const auto numbers =
            random.uniform(step, static_cast<Draw>(known.counter[2] & 7), known.counter[2] >> 3, known.counter[3]);
        for (std::size_t k = 0; k < 4; ++k) {
            const double middle = (std::floor(known.answer[k] / 512.0) + 0.5) / 8388608.0;
            CHECK(static_cast<double>(numbers[k]) == middle);  // exact in a float
        }
        // The fifth: lower 9, lower 9 and the upper 5 of the lower 9 bits.
        const double rest = (known.answer[0] % 512) * 16384.0 + (known.answer[1] % 512) * 32.0 +
                            std::floor((known.answer[2] % 512) / 16.0);
        CHECK(static_cast<double>(numbers[4]) == (rest + 0.5) / 8388608.0);
    }
}

TEST_CASE("numbers lie strictly between 0 and 1, evenly") {
    const std::vector<double> numbers = many_numbers();
    double sum = 0, squares = 0;
    for (const double x : numbers) {
        CHECK_UNARY(x > 0 && x < 1);
        sum += x - 0.5;
        squares += (x - 0.5) * (x - 0.5);
    }
    const auto count = static_cast<double>(numbers.size());
    // Seed fixed; 4 sigma. Of one uniform number: variance 1/12, and its square about 1/2 has the variance 1/180.
    CHECK(std::abs(sum / count) < 4 * std::sqrt(1 / (12 * count)));
    CHECK(std::abs(squares / count - 1.0 / 12) < 4 * std::sqrt(1 / (180 * count)));
}

TEST_CASE("the numbers of a block, and blocks that follow each other, have nothing to do with each other") {
    const std::vector<double> numbers = many_numbers();
    for (const std::size_t apart : {1u, 2u, 3u, 4u, 400u}) {
        double product = 0;
        for (std::size_t k = 0; k + apart < numbers.size(); ++k) {
            product += (numbers[k] - 0.5) * (numbers[k + apart] - 0.5);
        }
        const auto count = static_cast<double>(numbers.size() - apart);
        CAPTURE(apart);
        CHECK(std::abs(product / count) < 4 * std::sqrt(1 / (144 * count)));  // 4 sigma
    }
}

TEST_CASE("another seed, step, purpose, place or index is another block; the same name is the same block") {
    std::set<Uniforms> seen;
    std::size_t made = 0;
    // Values that differ in their upper half only are among them.
    for (const std::uint64_t seed : {std::uint64_t{1}, std::uint64_t{2}, std::uint64_t{1} << 32 | 1}) {
        const CounterRandom random(seed);
        for (const std::int64_t step : {std::int64_t{0}, std::int64_t{1}, std::int64_t{1} << 32}) {
            for (std::uint32_t draw = 0; draw < 4; ++draw) {
                for (const std::uint32_t place : {0u, 1u, 2u, 503u, (1u << 29) - 1}) {
                    for (const std::uint32_t index : {0u, 1u, 2u, ~0u}) {
                        const auto block = random.uniform(step, static_cast<Draw>(draw), place, index);
                        CHECK(CounterRandom(seed).uniform(step, static_cast<Draw>(draw), place, index) == block);
                        seen.insert(block);
                        ++made;
                    }
                }
            }
        }
    }
    CHECK(made == 3 * 3 * 4 * 5 * 4);
    CHECK(seen.size() == made);  // two of a thousand blocks of 115 bits agree by chance once in 1e29
}
