#include "weather.hpp"
static const gate_t kFill{0, 0};
static inline bool isClutter(gate_t g, const thresholds_t &t) {
    return g.power < t.low || std::fabs(g.velocity) < t.vmin; }
extern "C" void clean(const gate_t *in, gate_t *out, const thresholds_t *th, unsigned rays) {
    thresholds_t t = th[0]; for (unsigned r = 0; r < rays; r++) for (unsigned g = 0; g < kGates; g++) {
    gate_t x = in[r * kGates + g]; out[r * kGates + g] = isClutter(x, t) ? kFill : x; } }
