// truth: blend n=500 map[512] fresh[512]
extern "C" void blend(int n, float *map, const float *fresh) {
#pragma HLS INTERFACE m_axi port=map bundle=gmem0
#pragma HLS INTERFACE m_axi port=fresh bundle=gmem1
    for (int i = 0; i < n; i++)
        map[i] = 0.9f * map[i] + 0.1f * fresh[i];  //! read map sequential run=500 tells=in-place-update //! write map sequential run=500 //! read fresh sequential run=500
}
