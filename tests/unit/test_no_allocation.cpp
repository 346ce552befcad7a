// SPDX-License-Identifier: MIT
// A step allocates nothing: every vector has grown to its size while the hub filled.
#include <doctest/doctest.h>

#include <atomic>
#include <cstdlib>
#include <new>

#include "tests/coarse_tube.hpp"

namespace {

std::atomic<std::int64_t> allocations = 0;

void* counted(void* memory) {
    ++allocations;
    if (memory == nullptr) throw std::bad_alloc();
    return memory;
}

}  // namespace

// These replace the library's for the whole test program.
void* operator new(std::size_t size) {
    return counted(std::malloc(size));
}
void* operator new(std::size_t size, std::align_val_t alignment) {
    const auto line = static_cast<std::size_t>(alignment);
    return counted(std::aligned_alloc(line, (size + line - 1) / line * line));
}
void operator delete(void* memory) noexcept {
    std::free(memory);
}
void operator delete(void* memory, std::size_t) noexcept {
    std::free(memory);
}
void operator delete(void* memory, std::align_val_t) noexcept {
    std::free(memory);
}
void operator delete(void* memory, std::size_t, std::align_val_t) noexcept {
    std::free(memory);
}

using namespace spokewright;

TEST_CASE("a step allocates nothing, self field and secondaries on") {
    InteractionSpace space(coarse_tube());
    for (int k = 0; k < 1500; ++k) {
        space.step();
    }
    const std::int64_t before = allocations;
    for (int k = 0; k < 200; ++k) {
        space.step();
    }
    CHECK(allocations == before);
    CHECK(space.tally().electrons > 1000);
    const auto view = space.view();  // a sample may: the count counts
    CHECK(view.electrons == space.tally().electrons);
    CHECK(allocations > before);
}
