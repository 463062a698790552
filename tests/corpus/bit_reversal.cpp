// truth: bit_reverse in[256] out[256]
static unsigned reversed(unsigned x, int bits) {
    unsigned r = 0;
    for (int b = 0; b < bits; b++) {
        r = (r << 1) | (x & 1);
        x >>= 1;
    }
    return r;
}
extern "C" void bit_reverse(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (unsigned i = 0; i < 256; i++) out[i] = in[reversed(i, 8)];  //! read in irregular run=1 //! write out sequential run=256
}
