// truth: permute order[512]=permutation in[512] out[512]
extern "C" void permute(const int *order, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=order bundle=g0
#pragma HLS INTERFACE m_axi port=in bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    int where[512];
    for (int i = 0; i < 512; i++) where[i] = order[i];  //! read order sequential run=512
    for (int i = 0; i < 512; i++) out[where[i]] = in[i];  //! write out indirect run=1 tells=indirect-index //! read in sequential run=512
}
