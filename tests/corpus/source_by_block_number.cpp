// truth: gather_blocks a[256] b[256] out[512]
// Which memory is read changes from block to block, as the counter says.
extern "C" void gather_blocks(const int *a, const int *b, int *out) {
#pragma HLS INTERFACE m_axi port=a bundle=g0
#pragma HLS INTERFACE m_axi port=b bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    for (int block = 0; block < 16; block++) {
        const int *from = (block % 2 == 0) ? a + block / 2 * 32 : b + block / 2 * 32;
        for (int i = 0; i < 32; i++) out[block * 32 + i] = from[i];  //! read a,b sequential run=256 //! write out sequential run=512
    }
}
