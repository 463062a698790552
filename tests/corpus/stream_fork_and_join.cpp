// truth: fork n=120 in[120] out[120]
#include "hls_stream.h"
static void read_all(int n, const int *in, hls::stream<int> &even, hls::stream<int> &odd) {
    for (int i = 0; i < n; i++) {
        int v = in[i];  //! read in sequential run=120
        if (i % 2 == 0)
            even.write(v);
        else
            odd.write(v);
    }
}
static void write_all(int n, hls::stream<int> &even, hls::stream<int> &odd, int *out) {
    for (int i = 0; i < n; i++) out[i] = (i % 2 == 0) ? even.read() : odd.read();  //! write out sequential run=120
}
extern "C" void fork(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
#pragma HLS DATAFLOW
    hls::stream<int> even, odd;
    read_all(n, in, even, odd);
    write_all(n, even, odd, out);
}
