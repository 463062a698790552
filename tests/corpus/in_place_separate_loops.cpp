// truth: normalise map[256]
// Loaded whole, then stored whole: the port sees one long read, then one long write.
#define N 256
extern "C" void normalise(float *map) {
#pragma HLS INTERFACE m_axi port=map bundle=gmem0
    float local[N];
    float peak = 1e-9f;
    for (int i = 0; i < N; i++) {
        local[i] = map[i];  //! read map sequential run=256
        if (local[i] > peak) peak = local[i];
    }
    for (int i = 0; i < N; i++) map[i] = local[i] / peak;  //! write map sequential run=256
}
