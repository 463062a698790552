// truth: small_ints in[512] out[512]
#include <ap_int.h>
typedef ap_uint<10> index_t;
extern "C" void small_ints(const ap_int<24> *in, ap_int<24> *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (index_t i = 0; i < 512; i++) {
        ap_int<24> x = in[i];  //! read in sequential run=512 element=4
        out[i] = x + 1;  //! write out sequential run=512 element=4
    }
}
