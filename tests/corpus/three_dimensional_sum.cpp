// truth: project cube[4096] plane[256]
// Sums along the slowest axis, a plane at a time.
#define S 16
extern "C" void project(const float cube[S][S][S], float plane[S][S]) {
#pragma HLS INTERFACE m_axi port=cube bundle=g0
#pragma HLS INTERFACE m_axi port=plane bundle=g1
    for (int y = 0; y < S; y++)
        for (int x = 0; x < S; x++) {
            float sum = 0;
            for (int z = 0; z < S; z++) sum += cube[z][y][x];  //! read cube strided stride=1024 tells=strided-access
            plane[y][x] = sum;  //! write plane sequential run=256
        }
}
