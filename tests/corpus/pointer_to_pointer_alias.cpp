// truth: chain_alias in[256] out[256]
extern "C" void chain_alias(const float *in, float *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    const float *p = in;
    const float *const &q = p;
    float *o = out + 16, **oo = &o;
    for (int i = 0; i < 200; ++i) (*oo)[i] = q[i + 8];  //! read in sequential run=200 //! write out sequential run=200
}
