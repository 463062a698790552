// truth: copy_until n=700 in[700] out[700]
extern "C" void copy_until(unsigned n, const unsigned *in, unsigned *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    unsigned i = 0;
    for (;;) {
        if (i >= n) break;
        out[i] = in[i] ^ 0xffu;  //! read in sequential run=700 //! write out sequential run=700
        i++;
    }
}
