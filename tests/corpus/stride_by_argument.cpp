// truth: every n=960 step=6 in[960] out[160]
extern "C" void every(int n, int step, const short *in, short *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    int k = 0;
    for (int i = 0; i < n; i += step)
        out[k++] = in[i];  //! read in strided stride=12 tells=strided-access //! write out sequential run=160
}
