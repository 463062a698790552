// truth: add n=640 a[640] b[640] out[640]
extern "C" void add(int n, const int *a, const int *b, int *out) {
#pragma HLS INTERFACE m_axi port=a bundle=gmem
#pragma HLS INTERFACE m_axi port=b bundle=gmem
#pragma HLS INTERFACE m_axi port=out bundle=other
    for (int i = 0; i < n; i++)
        out[i] = a[i] + b[i];  //! read a sequential run=640 tells=shared-port tells=interleaved-accesses //! read b sequential run=640 //! write out sequential run=640
}
