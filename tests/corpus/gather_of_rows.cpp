// truth: pick_rays ray[32]=permutation in[4096] out[4096]
// The row is chosen by data, its gates follow one another.
extern "C" void pick_rays(const int *ray, const float *in, float *out) {
#pragma HLS INTERFACE m_axi port=ray bundle=g0
#pragma HLS INTERFACE m_axi port=in bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    for (int r = 0; r < 32; r++) {
        int which = ray[r];  //! read ray sequential run=32
        for (int g = 0; g < 128; g++) out[r * 128 + g] = in[which * 128 + g];  //! read in sequential/indirect run=128 //! write out sequential run=4096
    }
}
