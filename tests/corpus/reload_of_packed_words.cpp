// truth: unpack_bits n=512 words[16] out[512]
extern "C" void unpack_bits(int n, const unsigned *words, unsigned char *out) {
#pragma HLS INTERFACE m_axi port=words bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int i = 0; i < n; i++)
        out[i] = (words[i / 32] >> (i % 32)) & 1;  //! read words repeated tells=repeated-address //! write out sequential run=512
}
