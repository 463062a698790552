// truth: mirror in[256] out[256]
// The order is turned round in a local array, so memory sees rising addresses only.
#define LEN 256
extern "C" void mirror(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    int reversed[LEN];
    for (int i = 0; i < LEN; i++) reversed[LEN - 1 - i] = in[i];  //! read in sequential run=256
    for (int i = 0; i < LEN; i++) out[i] = reversed[i];  //! write out sequential run=256
}
