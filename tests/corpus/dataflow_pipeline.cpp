// truth: pipeline beats=128 in[128] out[128] quiet
#include "ap_int.h"
#include "hls_stream.h"
using beat = ap_uint<512>;
static void load(const beat *in, hls::stream<beat> &s, int beats) {
load:
    for (int i = 0; i < beats; i++) {
#pragma HLS PIPELINE II=1
        s << in[i];  //! read in sequential run=128 element=64
    }
}
static void compute(hls::stream<beat> &s, hls::stream<beat> &t, int beats) {
    for (int i = 0; i < beats; i++) {
#pragma HLS PIPELINE II=1
        beat b = s.read();
        t.write(b ^ beat(~0u));
    }
}
static void store(hls::stream<beat> &t, beat *out, int beats) {
    for (int i = 0; i < beats; i++) {
#pragma HLS PIPELINE II=1
        out[i] = t.read();  //! write out sequential run=128 element=64
    }
}
extern "C" void pipeline(int beats, const beat *in, beat *out) {
#pragma HLS INTERFACE m_axi port=in offset=slave bundle=gmem0 max_read_burst_length=64 num_read_outstanding=32
#pragma HLS INTERFACE m_axi port=out offset=slave bundle=gmem1 max_write_burst_length=64 num_write_outstanding=32
#pragma HLS DATAFLOW
    hls::stream<beat> s("s"), t("t");
#pragma HLS STREAM variable=s depth=64
    load(in, s, beats);
    compute(s, t, beats);
    store(t, out, beats);
}
