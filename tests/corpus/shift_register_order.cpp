// truth: pseudo_random in[1024] out[400]
extern "C" void pseudo_random(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    unsigned short state = 0x2a7;
    for (int i = 0; i < 400; i++) {
        out[i] = in[state & 1023];  //! read in irregular run=1 //! write out sequential run=400
        unsigned bit = (state ^ (state >> 2) ^ (state >> 3) ^ (state >> 5)) & 1;
        state = (state >> 1) | (bit << 15);
    }
}
