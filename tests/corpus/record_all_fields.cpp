// truth: norms n=200 in[200] out[200]
// Every field of the record is used, one after the other.
struct Vector3 {
    int x, y, z, pad;
};
extern "C" void norms(int n, const Vector3 *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int i = 0; i < n; i++) {
        int x = in[i].x;  //! read in sequential element=16 run=200
        int y = in[i].y;  //! read in sequential element=16 run=200
        int z = in[i].z;  //! read in sequential element=16 run=200
        int w = in[i].pad;  //! read in sequential element=16 run=200
        out[i] = x * x + y * y + z * z + w;  //! write out sequential run=200
    }
}
