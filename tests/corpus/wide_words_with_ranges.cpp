// truth: scale_words words=64 in[64] out[64] quiet
#include <ap_int.h>
typedef ap_uint<512> word_t;
extern "C" void scale_words(int words, const word_t *in, word_t *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0 max_read_burst_length=64 num_read_outstanding=32
#pragma HLS INTERFACE m_axi port=out bundle=gmem1 max_write_burst_length=64 num_write_outstanding=32
    for (int i = 0; i < words; i++) {
#pragma HLS PIPELINE II=1
        word_t w = in[i];  //! read in sequential run=64 element=64
        word_t r;
        for (int l = 0; l < 16; l++) {
#pragma HLS UNROLL
            ap_uint<32> x = w.range(32 * l + 31, 32 * l);
            r.range(32 * l + 31, 32 * l) = x + 1;
        }
        out[i] = r;  //! write out sequential run=64 element=64
    }
}
