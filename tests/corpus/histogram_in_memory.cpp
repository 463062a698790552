// truth: histogram n=600 in[600]=0..1023 bins[1024]=zero
extern "C" void histogram(int n, const unsigned short *in, unsigned *bins) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=bins bundle=gmem1
    for (int i = 0; i < n; i++) {
        unsigned short level = in[i];  //! read in sequential run=600
        bins[level]++;  //! read bins indirect run=1 tells=indirect-index //! write bins indirect run=1
    }
}
