// truth: to_planes in[768] out[768]
#define PIXELS 256
extern "C" void to_planes(const unsigned char *in, unsigned char *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int ch = 0; ch < 3; ch++)
        for (int p = 0; p < PIXELS; p++)
            out[ch * PIXELS + p] = in[p * 3 + ch];  //! read in strided stride=3 //! write out sequential run=768
}
