// truth: octaves n=4096 spectrum[4096] power[16]
extern "C" void octaves(int n, const float *spectrum, float *power) {
#pragma HLS INTERFACE m_axi port=spectrum bundle=gmem0
#pragma HLS INTERFACE m_axi port=power bundle=gmem1
    int band = 0;
    for (int i = 4; i < n; i *= 2) {
        power[band] = spectrum[i];  //! read spectrum irregular run=1 //! write power sequential run=10
        band++;
    }
}
