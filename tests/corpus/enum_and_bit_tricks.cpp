// truth: tags n=128 in[512] out[128]
enum Layout { WORDS_SHIFT = 2, TAG_WORD = 3 };
static const unsigned SIZE = 1u << 7;
extern "C" void tags(unsigned n, const unsigned *in, unsigned *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (unsigned i = 0; i != (n & (SIZE | 0x7f)); ++i)
        out[i] = in[(i << WORDS_SHIFT) | TAG_WORD];  //! read in strided stride=16 tells=strided-access //! write out sequential run=128
}
