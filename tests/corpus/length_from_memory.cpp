// truth: copy_frame header[4]=60..90 in[128] out[128]
extern "C" void copy_frame(const int *header, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=header bundle=g0
#pragma HLS INTERFACE m_axi port=in bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    int length = header[1];  //! read header single
    for (int i = 0; i < length; i++) out[i] = in[i];  //! read in sequential run=data //! write out sequential run=data
}
