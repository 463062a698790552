// truth: select_polarisation flag[256]=0..1 h[256] v[256] out[256]
void select_polarisation(const char *flag, const float *h, const float *v, float *out) {
#pragma HLS INTERFACE m_axi port=flag bundle=f
#pragma HLS INTERFACE m_axi port=h bundle=h
#pragma HLS INTERFACE m_axi port=v bundle=v
#pragma HLS INTERFACE m_axi port=out bundle=o
    for (int i = 0; i < 256; i++) {
        const float *from = flag[i] ? v : h;  //! read flag sequential run=256
        out[i] = from[i];  //! read h,v steered tells=data-dependent-destination //! write out sequential run=256
    }
}
