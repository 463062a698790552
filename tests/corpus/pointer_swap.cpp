// truth: iterate a[256] b[256]
extern "C" void iterate(int *a, int *b) {
#pragma HLS INTERFACE m_axi port=a bundle=g0
#pragma HLS INTERFACE m_axi port=b bundle=g1
    int *from = a, *to = b;
    for (int t = 0; t < 6; t++) {
        for (int i = 0; i < 256; i++) to[i] = from[i] + t;  //! read a,b sequential run=256 //! write a,b sequential run=256
        int *keep = from;
        from = to;
        to = keep;
    }
}
