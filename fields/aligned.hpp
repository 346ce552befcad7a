// SPDX-License-Identifier: MIT
// A std::vector whose storage starts on a 64-byte line, as FFTW's and the compiler's vector loads like it.
#pragma once

#include <cstddef>
#include <new>
#include <vector>

namespace spokewright {

template <class T>
struct AlignedAllocator {
    using value_type = T;
    static constexpr std::align_val_t kAlignment{64};

    AlignedAllocator() = default;
    template <class U>
    AlignedAllocator(const AlignedAllocator<U>&) {}

    T* allocate(std::size_t count) { return static_cast<T*>(::operator new(count * sizeof(T), kAlignment)); }
    void deallocate(T* storage, std::size_t) { ::operator delete(storage, kAlignment); }
    template <class U>
    bool operator==(const AlignedAllocator<U>&) const {
        return true;
    }
};

template <class T>
using AlignedVector = std::vector<T, AlignedAllocator<T>>;

}  // namespace spokewright
