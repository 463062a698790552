// truth: deinterleave in[512] even[256] odd[256]
// Which memory is written is known from the counter: nothing depends on data.
extern "C" void deinterleave(const int *in, int *even, int *odd) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=even bundle=gmem1
#pragma HLS INTERFACE m_axi port=odd bundle=gmem2
    for (int i = 0; i < 512; i++) {
        int *target = (i & 1) ? odd : even;
        target[i >> 1] = in[i];  //! write even,odd sequential run=256 //! read in sequential run=512
    }
}
