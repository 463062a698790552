// Memory, values and streams for the arguments of a kernel under observation.
#pragma once
#include "hooks.h"

#include <cstdio>
#include <cstdlib>
#include <cstring>
#include <new>
#include <tuple>
#include <type_traits>

#define ORACLE_QUIET __attribute__((no_sanitize("thread")))

namespace oracle {

template <class Result, class... Args>
std::tuple<Args...> arguments_of(Result (*)(Args...));

template <class Type, class = void>
struct element {
    using type = std::remove_cv_t<std::remove_all_extents_t<std::remove_pointer_t<std::decay_t<Type>>>>;
};
template <class Type>
struct element<Type, std::void_t<typename Type::element>> {  // a pointer that is used through burst requests
    using type = typename Type::element;
};
template <class Type>
using element_of = typename element<Type>::type;

template <class Argument, class Pointer>
ORACLE_QUIET Argument pass(Pointer* memory) {
    if constexpr (std::is_pointer_v<Argument>) return reinterpret_cast<Argument>(memory);
    else if constexpr (std::is_reference_v<Argument>) return *memory;
    else return Argument(memory);
}

inline uint32_t next_random() {  // xorshift32 from a fixed seed: every run sees the same data (Marsaglia 2003, from memory)
    static uint32_t state = 2463534242u;
    state ^= state << 13;
    state ^= state >> 17;
    state ^= state << 5;
    return state;
}

inline long uniform(long low, long high) { return low + static_cast<long>(next_random() % static_cast<uint32_t>(high - low + 1)); }

template <class Type, class = void>
struct has_data : std::false_type {};
template <class Type>
struct has_data<Type, std::void_t<decltype(std::declval<Type&>().data = 1), decltype(std::declval<Type&>().last = 1)>> : std::true_type {};

// One element from one number: numbers by value, packets by their data (every 16th is the last of its packet), and any
// other record word by word.
template <class Type, class Next>
ORACLE_QUIET void put(Type& target, long index, Next next) {
    if constexpr (has_data<Type>::value) {
        target.data = next();
        target.last = index % 16 == 15;
    } else if constexpr (std::is_constructible_v<Type, long>) {
        target = static_cast<Type>(next());
    } else {
        uint32_t words[(sizeof(Type) + 3) / 4];
        for (auto& word : words) word = static_cast<uint32_t>(next());
        std::memcpy(static_cast<void*>(&target), words, sizeof target);
    }
}

enum class Fill { range, iota, permutation, cycle, rows, zero };

// Numbers of one kind, one after the other.
class Numbers {
public:
    ORACLE_QUIET Numbers(Fill kind, long low, long high, size_t count) : kind(kind), low(low), high(high) {
        if (kind != Fill::permutation && kind != Fill::cycle) return;
        auto* order = static_cast<long*>(std::malloc(count * sizeof(long)));
        table = static_cast<long*>(std::malloc(count * sizeof(long)));
        for (size_t i = 0; i < count; ++i) order[i] = static_cast<long>(i);
        for (size_t i = count; i-- > 1;) {
            size_t j = static_cast<size_t>(uniform(0, static_cast<long>(i)));
            long keep = order[i];
            order[i] = order[j];
            order[j] = keep;
        }
        for (size_t i = 0; i < count; ++i) {
            if (kind == Fill::permutation) table[i] = order[i];
            else table[order[i]] = order[(i + 1) % count];  // one round through all elements
        }
        std::free(order);
    }
    ORACLE_QUIET long next() {
        long value = 0;
        switch (kind) {
            case Fill::range: value = uniform(low, high); break;
            case Fill::iota: value = low + position; break;
            case Fill::permutation:
            case Fill::cycle: value = table[position]; break;
            case Fill::rows:  // ascending row pointers: rows of low to high elements
                value = sum;
                sum += uniform(low, high);
                break;
            case Fill::zero: break;
        }
        ++position;
        return value;
    }

private:
    Fill kind;
    long low, high, position = 0, sum = 0;
    long* table = nullptr;
};

// The next kernel argument: ``count`` elements on a 4 KB boundary, filled and watched.
template <class Argument>
ORACLE_QUIET auto* buffer(size_t count, Fill kind, long low, long high, const char* name) {
    using Element = element_of<Argument>;
    size_t bytes = (count * sizeof(Element) + 4095) / 4096 * 4096 + 4096;
    auto* memory = static_cast<Element*>(std::aligned_alloc(4096, bytes));
    Numbers numbers(kind, low, high, count);
    for (size_t i = 0; i < count; ++i) put(*new (memory + i) Element, static_cast<long>(i), [&] { return numbers.next(); });
    oracle_watch(memory, count * sizeof(Element));
    std::printf("%s %zu %d\n", name, sizeof(Element), std::is_class_v<Element>);
    return memory;
}

template <class Stream>
ORACLE_QUIET void preload(Stream& stream, size_t count, Fill kind, long low, long high) {
    Numbers numbers(kind, low, high, count);
    for (size_t i = 0; i < count; ++i) {
        auto value = typename Stream::element();
        put(value, static_cast<long>(i), [&] { return numbers.next(); });
        stream.write(value);
    }
}

}  // namespace oracle
