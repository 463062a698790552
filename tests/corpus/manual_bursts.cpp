// truth: relay in[1024] out[1024]
#include "hls_burst_maxi.h"
void relay(hls::burst_maxi<int> in, hls::burst_maxi<int> out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    int block[64];
    for (int b = 0; b < 16; b++) {
        in.read_request(b * 64, 64);  //! read in sequential run=64
        for (int i = 0; i < 64; i++) block[i] = in.read();
        out.write_request(b * 64, 64);  //! write out sequential run=64
        for (int i = 0; i < 64; i++) out.write(block[i] + 1);
        out.write_response();
    }
}
