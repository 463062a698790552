// truth: count_steps n=200 in[201] out[200]
// The load stands in the head of the loop.
extern "C" void count_steps(int n, const int *in, int *out);
extern "C" void count_steps(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    int i = 0;
    for (int x = in[0]; i < n; x = in[++i])  //! read in single //! read in sequential run=200
        out[i] = x;  //! write out sequential run=200
}
