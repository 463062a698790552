// truth: expand n=40 value[40] length[40]=1..8 out[400]
extern "C" void expand(int n, const int *value, const int *length, int *out) {
#pragma HLS INTERFACE m_axi port=value bundle=g0
#pragma HLS INTERFACE m_axi port=length bundle=g1
#pragma HLS INTERFACE m_axi port=out bundle=g2
    int *to = out;
    for (int i = 0; i < n; i++) {
        int v = value[i];  //! read value sequential run=40
        int left = length[i];  //! read length sequential run=40
        while (left-- > 0) *to++ = v;  //! write out sequential/indirect run=data
    }
}
