// truth: deal key[256]=0..7 a[256] b[256] c[256] d[256]
extern "C" void deal(const int *key, int *a, int *b, int *c, int *d) {
#pragma HLS INTERFACE m_axi port=key bundle=g0
#pragma HLS INTERFACE m_axi port=a bundle=g1
#pragma HLS INTERFACE m_axi port=b bundle=g2
#pragma HLS INTERFACE m_axi port=c bundle=g3
#pragma HLS INTERFACE m_axi port=d bundle=g4
    int *bank[4] = {a, b, c, d};
    for (int i = 0; i < 256; i++) {
        int k = key[i];  //! read key sequential run=256
        bank[k & 3][i] = k;  //! write a,b,c,d steered tells=data-dependent-destination
    }
}
