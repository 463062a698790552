// truth: collect s<300> out[300]
#include "ap_axi_sdata.h"
#include "hls_stream.h"
typedef ap_axiu<32, 1, 1, 1> packet;
extern "C" void collect(hls::stream<packet> &s, unsigned *out) {
#pragma HLS INTERFACE axis port=s
#pragma HLS INTERFACE m_axi port=out bundle=gmem0
    for (int i = 0; i < 300; i++) {
        packet p = s.read();
        out[i] = p.data;  //! write out sequential run=300
    }
}
