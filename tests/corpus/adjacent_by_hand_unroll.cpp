// truth: energy n=512 iq[512] out[128]
extern "C" void energy(int n, const int *iq, int *out) {
#pragma HLS INTERFACE m_axi port=iq bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 0; i < n; i += 4)
        out[i / 4] = iq[i] + iq[i + 1] + iq[i + 2] + iq[i + 3];  //! read iq sequential joined run=512 //! write out sequential run=128
}
