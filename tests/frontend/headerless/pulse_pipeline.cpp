#include "pulse.hpp"
static void fetch(const bus_t *src, hls::stream<bus_t> &dst, const int words) {
  for (int i = 0; i < words; ++i) {
#pragma HLS PIPELINE II=1
    dst.write(src[i]);
  }
}
static void work(hls::stream<bus_t> &in, hls::stream<bus_t> &out, int words) {
  for (int i = 0; i < words; ++i) {
    bus_t w = in.read();
    for (int l = 0; l < LANES; ++l) {
#pragma HLS UNROLL
      w.range((l + 1) * LANE_BITS - 1, l * LANE_BITS) = transform(w.range((l + 1) * LANE_BITS - 1, l * LANE_BITS));
    }
    out.write(w);
  }
}
extern "C" {
void pulse(const bus_t *src, bus_t *dst, int words) {
#pragma HLS INTERFACE m_axi port=src offset=slave bundle=gmem0
#pragma HLS DATAFLOW
  hls::stream<bus_t> a, b;
  fetch(src, a, words);
  work(a, b, words);
  for (int i = 0; i < words; i++) dst[i] = b.read();
}
}
