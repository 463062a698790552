// truth: axpy in[96] acc[96] quiet
#include <hls_vector.h>
using lanes = hls::vector<float, 16>;
extern "C" void axpy(const lanes *in, lanes *acc) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0 max_read_burst_length=64 num_read_outstanding=32
#pragma HLS INTERFACE m_axi port=acc bundle=gmem1 max_write_burst_length=64 num_write_outstanding=32
    for (int i = 0; i < 96; ++i) {
        lanes v = in[i];  //! read in sequential run=96 element=64
        acc[i] = v * lanes(2.0f) + lanes(1.0f);  //! write acc sequential run=96 element=64
    }
}
