// truth: length text[500]=cycle out[1]
extern "C" void length(const unsigned *text, unsigned *out) {
#pragma HLS INTERFACE m_axi port=text bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    unsigned n = 0;
    while (text[n] != 0) n++;  //! read text sequential run=data tells=early-exit
    *out = n;  //! write out single
}
