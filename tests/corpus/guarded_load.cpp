// truth: masked_sum mask[2000]=0..1 big[2000] sum[1]
extern "C" void masked_sum(const unsigned char *mask, const int *big, int *sum) {
#pragma HLS INTERFACE m_axi port=mask bundle=g0
#pragma HLS INTERFACE m_axi port=big bundle=g1
#pragma HLS INTERFACE m_axi port=sum bundle=g2
    int s = 0;
    for (int i = 0; i < 2000; i++) {
        if (!mask[i]) continue;  //! read mask sequential run=2000
        s += big[i];  //! read big sequential run=2 guarded basis=data tells=guarded-access
    }
    *sum = s;  //! write sum single
}
