// truth: assign points=120 point[480] centre[32] label[120]
#define DIM 4
#define CENTRES 8
extern "C" void assign(int points, const float *point, const float *centre, int *label) {
#pragma HLS INTERFACE m_axi port=point bundle=g0
#pragma HLS INTERFACE m_axi port=centre bundle=g1
#pragma HLS INTERFACE m_axi port=label bundle=g2
    for (int p = 0; p < points; p++) {
        float nearest = 1e30f;
        int which = 0;
        for (int c = 0; c < CENTRES; c++) {
            float distance = 0;
            for (int d = 0; d < DIM; d++) {
                float difference = point[p * DIM + d] - centre[c * DIM + d];  //! read point sequential run=4.4 //! read centre sequential run=32
                distance += difference * difference;
            }
            if (distance < nearest) {
                nearest = distance;
                which = c;
            }
        }
        label[p] = which;  //! write label sequential run=120
    }
}
