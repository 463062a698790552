// truth: add_lanes a[1024] b[1024] sum[1024]
template <int LANES>
void lanes_of(const float *a, const float *b, float *sum, int base) {
#pragma HLS INLINE
    for (int l = 0; l < LANES; ++l) {
#pragma HLS UNROLL
        sum[base + l] = a[base + l] + b[base + l];  //! read a,b sequential run=1024 //! write sum sequential run=1024
    }
}
extern "C" void add_lanes(const float *a, const float *b, float *sum) {
#pragma HLS INTERFACE m_axi port=a bundle=a
#pragma HLS INTERFACE m_axi port=b bundle=b
#pragma HLS INTERFACE m_axi port=sum bundle=sum
    for (int i = 0; i < 1024; i += 16) {
#pragma HLS PIPELINE
        lanes_of<16>(a, b, sum, i);
    }
}
