// truth: interleave left[300] right[300] out[600]
extern "C" void interleave(const short *left, const short *right, short *out) {
#pragma HLS INTERFACE m_axi port=left bundle=g0
#pragma HLS INTERFACE m_axi port=right bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    short *to = out;
    for (int i = 0; i < 300; i++) {
        *to++ = *left++;  //! write out sequential joined run=600 //! read left sequential run=300
        *to++ = *right++;  //! write out sequential joined run=600 //! read right sequential run=300
    }
}
