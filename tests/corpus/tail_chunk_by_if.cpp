// truth: scale_chunks n=1000 in[1024] out[1024]
#define CHUNK 64
extern "C" void scale_chunks(int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    int buffer[CHUNK];
    for (int i = 0; i < n; i += CHUNK) {
        int length = CHUNK;
        if (i + CHUNK > n) length = n - i;
    fill:
        for (int j = 0; j < length; ++j) buffer[j] = in[i + j];  //! read in sequential run=1000
    flush:
        for (int j = 0; j < length; ++j) out[i + j] = 3 * buffer[j];  //! write out sequential run=1000
    }
}
