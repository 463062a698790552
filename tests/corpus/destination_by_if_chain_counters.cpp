// truth: sort_by_range dist[300]=0..299 near_[300] mid[300] far_[300]
extern "C" {
void sort_by_range(const int dist[300], int near_[300], int mid[300], int far_[300]) {
#pragma HLS INTERFACE m_axi port=dist bundle=gmem0
#pragma HLS INTERFACE m_axi port=near_ bundle=gmem1
#pragma HLS INTERFACE m_axi port=mid bundle=gmem2
#pragma HLS INTERFACE m_axi port=far_ bundle=gmem3
    int a = 0, b = 0, c = 0;
    for (int i = 0; i < 300; i++) {
        int d = dist[i];  //! read dist sequential run=300
        if (d < 100) {
            near_[a++] = d;  //! write near_ steered tells=data-dependent-destination
        } else if (d < 200) {
            mid[b++] = d;  //! write mid steered
        } else {
            far_[c++] = d;  //! write far_ steered
        }
    }
}
}
