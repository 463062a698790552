// truth: two_banks key[256]=0..1 a[256] b[256]
extern "C" void two_banks(const int *key, int *a, int *b) {
#pragma HLS INTERFACE m_axi port=key bundle=g0
#pragma HLS INTERFACE m_axi port=a bundle=g1
#pragma HLS INTERFACE m_axi port=b bundle=g2
    for (int i = 0; i < 256; i++) {
        int *to = a;
        if (key[i] != 0) to = b;  //! read key sequential run=256
        to[i] = i;  //! write a,b steered tells=data-dependent-destination
    }
}
