// truth: radix n=256 in[256]=0..255 out[256]
// Counts on the chip, then scatters.
extern "C" void radix(int n, const unsigned *in, unsigned *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    unsigned count[16] = {0}, start[16];
    for (int i = 0; i < n; i++) count[in[i] & 15]++;  //! read in sequential run=256
    start[0] = 0;
    for (int d = 1; d < 16; d++) start[d] = start[d - 1] + count[d - 1];
    for (int i = 0; i < n; i++) {
        unsigned x = in[i];  //! read in sequential run=256
        out[start[x & 15]++] = x;  //! write out indirect run=1 tells=indirect-index
    }
}
