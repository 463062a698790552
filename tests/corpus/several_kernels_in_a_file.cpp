// truth: second in[96] out[96]
extern "C" {
void first(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int i = 0; i < 96; i++) out[95 - i] = in[i];
}
void second(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int i = 0; i < 96; i++) out[i] = in[i];  //! read in sequential run=96 //! write out sequential run=96
}
}
