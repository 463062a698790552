#include "common/defs.h"
KERNEL_BEGIN
STATIC_INLINE float clampf(float x) { return x < 0 ? 0 : x; }
KERNEL void resample(GLOBAL const float *RESTRICT in, GLOBAL float *RESTRICT out, int n) {
  PRAGMA_HLS(HLS INTERFACE m_axi port=in bundle=a)
  for (int i = 0; i < n; i++) {
    HLS_PIPELINE(1)
    out[i] = clampf(in[i * STEP]) * SCALE;
  }
}
KERNEL_END
