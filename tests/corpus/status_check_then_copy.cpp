// truth: maybe_copy n=100 status[1]=1..1 in[100] out[100]
// Whether anything is copied depends on data, but not within the loop.
extern "C" void maybe_copy(int n, const int *status, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=status bundle=g0
#pragma HLS INTERFACE m_axi port=in bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    int ready = *status;  //! read status single
    if (!ready) return;
    for (int i = 0; i < n; i++) out[i] = in[i];  //! read in sequential run=100 //! write out sequential run=100
}
