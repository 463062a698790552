// A vector that moves as one value; arithmetic lane by lane. Copies are functions, see ap_int.h.
#pragma once
#include <cstddef>

namespace hls {

template <class Element, std::size_t LANES>
struct vector {
    Element lanes[LANES];
    vector() = default;
    vector(const vector& other) { *this = other; }
    vector& operator=(const vector& other) {
        for (std::size_t i = 0; i < LANES; ++i) lanes[i] = other.lanes[i];
        return *this;
    }
    vector(const Element& value) {
        for (auto& lane : lanes) lane = value;
    }
    Element& operator[](std::size_t i) { return lanes[i]; }
    const Element& operator[](std::size_t i) const { return lanes[i]; }
    static constexpr std::size_t size() { return LANES; }
#define ORACLE_LANEWISE(op)                                                            \
    vector& operator op##=(const vector& other) {                                      \
        for (std::size_t i = 0; i < LANES; ++i) lanes[i] op##= other.lanes[i];         \
        return *this;                                                                  \
    }                                                                                  \
    friend vector operator op(vector left, const vector& right) { return left op##= right; }
    ORACLE_LANEWISE(+)
    ORACLE_LANEWISE(-)
    ORACLE_LANEWISE(*)
    ORACLE_LANEWISE(/)
#undef ORACLE_LANEWISE
    Element reduce_add() const {
        Element sum = lanes[0];
        for (std::size_t i = 1; i < LANES; ++i) sum += lanes[i];
        return sum;
    }
};

}  // namespace hls
