// truth: until_found n=500 in[500]=iota out[1]
extern "C" void until_found(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    bool found = false;
    int at = 0;
    for (int i = 0; i < n && !found; i++) {
        int x = in[i];  //! read in sequential run=data tells=early-exit
        if (x == 333) {
            found = true;
            at = i;
        }
    }
    out[0] = at;  //! write out single
}
