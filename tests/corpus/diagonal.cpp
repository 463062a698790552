// truth: trace m[1024] out[32]
extern "C" void trace(const float m[32][32], float *out) {
#pragma HLS INTERFACE m_axi port=m bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 0; i < 32; i++) out[i] = m[i][i];  //! read m strided stride=132 //! write out sequential run=32
}
