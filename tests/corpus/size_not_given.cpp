// truth: copy n~1024 in[1024] out[1024]
extern "C" void copy(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 0; i < n; i++)
        out[i] = in[i];  //! read in sequential run=1024 basis=assumed tells=assumed-size //! write out sequential run=1024 basis=assumed
}
