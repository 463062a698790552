// truth: butterfly in[512] out[512]
extern "C" void butterfly(const float *in, float *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 0; i < 512; i++) out[i] = in[i ^ 1];  //! read in irregular run=1 //! write out sequential run=512
}
