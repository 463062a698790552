#include "systolic.h"
typedef hls::vector<elem, SIMD> vec_t;
static void feeder(const vec_t *A, hls::stream<vec_t> fifo[PE_ROWS], int tiles) {
#pragma HLS ARRAY_PARTITION variable=fifo complete
  for (int t = 0; t < tiles; t++) for (int k = 0; k < TILE_K / SIMD; k++) for (int r = 0; r < PE_ROWS;
      r++) fifo[r].write(A[(t * PE_ROWS + r) * (TILE_K / SIMD) + k]); }
template <int ROW, int COL> static void pe(hls::stream<vec_t> &a, hls::stream<vec_t> &b, hls::stream<elem> &c) { elem acc = 0; for (int k = 0; k < TILE_K / SIMD; k++) { vec_t x = a.read(), y = b.read(); for (int s = 0; s < SIMD; s++) acc += x[s] * y[s]; } c.write(acc); }
extern "C" void systolic(const vec_t *A, const vec_t *B, elem *C, int tiles) {
    hls::stream<vec_t, 4> fa[PE_ROWS], fb[PE_COLS]; hls::stream<elem> fc[PE_ROWS][PE_COLS];
    feeder(A, fa, tiles); feeder(B, fb, tiles); pe<0, 0>(fa[0], fb[0], fc[0][0]); for (int r = 0;
    r < PE_ROWS; r++) for (int c = 0; c < PE_COLS; c++) C[r * PE_COLS + c] = fc[r][c].read(); }
