// truth: forward count=40 in[1024]=4..12 out[1024]
// Each packet starts with its length.
extern "C" void forward(int count, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    int from = 0, to = 0;
    for (int p = 0; p < count; p++) {
        int length = in[from];  //! read in indirect run=1
        for (int i = 0; i < length; i++)
            out[to + i] = in[from + 1 + i];  //! read in sequential/indirect run=data //! write out sequential/indirect run=data
        from += length + 1;
        to += length;
    }
}
