// truth: backward n=320 in[320] out[320]
extern "C" void backward(unsigned n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (unsigned i = n - 1; i < n; --i)
        out[i] = in[i] + 1;  //! read in descending //! write out descending
}
