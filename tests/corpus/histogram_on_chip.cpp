// truth: histogram n=600 in[600]=0..255 bins[256]=zero
extern "C" void histogram(int n, const unsigned char *in, unsigned *bins) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=bins bundle=gmem1
    unsigned local[256] = {0};
    for (int i = 0; i < n; i++) local[in[i]]++;  //! read in sequential run=600
    for (int b = 0; b < 256; b++) bins[b] = local[b];  //! write bins sequential run=256
}
