// truth: part first=37 n=400 in[512] out[512]
extern "C" void part(int first, int n, const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    const int *from = in + first;
    for (int i = 0; i < n; i++) out[i] = from[i];  //! read in sequential run=400 basis=given //! write out sequential run=400
}
