// truth: both ints[512] shorts[512] total[2]
template <class T, int N, int STEP>
static T fold(const T *data) {
    T sum = 0;
    for (int i = 0; i < N; i += STEP)
        sum += data[i];  //! read ints sequential run=512 //! read shorts strided stride=8 tells=strided-access
    return sum;
}
extern "C" void both(const int *ints, const short *shorts, int *total) {
#pragma HLS INTERFACE m_axi port=ints bundle=gmem0
#pragma HLS INTERFACE m_axi port=shorts bundle=gmem1
#pragma HLS INTERFACE m_axi port=total bundle=gmem2
    total[0] = fold<int, 512, 1>(ints);  //! write total single
    total[1] = fold<short, 512, 4>(shorts);  //! write total single
}
