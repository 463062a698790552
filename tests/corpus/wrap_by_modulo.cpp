// truth: cyclic48 window[48] out[480]
extern "C" void cyclic48(const float *window, float *out) {
#pragma HLS INTERFACE m_axi port=window bundle=gmem1
#pragma HLS INTERFACE m_axi port=out bundle=gmem2
    for (int i = 0; i < 480; i++)
        out[i] = 2.f * window[i % 48];  //! read window sequential run=48 //! write out sequential run=480
}
