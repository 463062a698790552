// truth: unpack_bits n=512 words[16] out[512]
extern "C" void unpack_bits(int n, const unsigned *words, unsigned char *out) {
#pragma HLS INTERFACE m_axi port=words bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    unsigned word = 0;
    for (int i = 0; i < n; i++) {
        if ((i & 31) == 0) word = words[i >> 5];  //! read words sequential run=16
        out[i] = (word >> (i & 31)) & 1;  //! write out sequential run=512
    }
}
