// truth: split_by_sign in[512]=0..255 wet[512] dry[512]
extern "C" void split_by_sign(const int *in, int *wet, int *dry) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=wet bundle=g1
#pragma HLS INTERFACE m_axi port=dry bundle=g2
    for (int i = 0; i < 512; ++i) {
        int echo = in[i];  //! read in sequential run=512
        int *target = echo > 127 ? wet : dry;
        target[i] = echo;  //! write wet,dry steered tells=data-dependent-destination
    }
}
