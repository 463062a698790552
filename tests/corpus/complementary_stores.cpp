// truth: threshold in[400] out[400]
extern "C" void threshold(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 0; i < 400; i++) {
        int x = in[i];  //! read in sequential run=400
        if (x > 127)
            out[i] = x;  //! write out sequential joined run=400
        else
            out[i] = 0;  //! write out sequential joined run=400
    }
}
