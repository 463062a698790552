// truth: collect s<64> out[64]
#include "ap_axi_sdata.h"
#include "hls_stream.h"
typedef ap_axiu<32, 1, 1, 1> packet;
extern "C" void collect(hls::stream<packet> &s, unsigned *out) {
#pragma HLS INTERFACE axis port=s
#pragma HLS INTERFACE m_axi port=out bundle=gmem0
    bool last = false;
    int i = 0;
    while (!last) {
        packet p = s.read();
        last = p.last;
        out[i++] = p.data;  //! write out sequential run=data tells=early-exit
    }
}
