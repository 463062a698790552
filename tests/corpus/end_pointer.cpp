// truth: range_loop n=450 in[450] out[450]
extern "C" void range_loop(unsigned long n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    int *to = out;
    for (const int *p = in, *end = in + n; p != end; ++p, ++to)
        *to = *p >> 1;  //! read in sequential run=450 //! write out sequential run=450
}
