// truth: add_halves in[1024] out[512]
extern "C" void add_halves(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 0; i < 512; i++)
        out[i] = in[i] + in[i + 512];  //! read in sequential run=512 tells=interleaved-accesses //! write out sequential run=512
}
