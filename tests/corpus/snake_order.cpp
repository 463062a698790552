// truth: snake in[1024] out[1024]
// Even rows forward, odd rows backward, as the antenna nods.
extern "C" void snake(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    int k = 0;
    for (int r = 0; r < 32; r++) {
        if (r % 2 == 0)
            for (int c = 0; c < 32; c++) out[k++] = in[r * 32 + c];  //! read in sequential run=32 //! write out sequential run=32
        else
            for (int c = 31; c >= 0; c--) out[k++] = in[r * 32 + c];  //! read in descending //! write out sequential run=32
    }
}
