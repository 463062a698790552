// truth: scatter n=200 keys<200>=0..1023 out[1024]
#include "hls_stream.h"
extern "C" void scatter(int n, hls::stream<int> &keys, int *out) {
#pragma HLS INTERFACE axis port=keys
#pragma HLS INTERFACE m_axi port=out bundle=gmem0
    for (int i = 0; i < n; i++) {
        int key = keys.read();
        out[key & 1023] = i;  //! write out indirect run=1 tells=indirect-index
    }
}
