// truth: copy_cells in[200] out[200]
struct Cell {
    float reflectivity;
    float velocity;
    int station;
    int flags;
};
extern "C" void copy_cells(const Cell *in, Cell *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 0; i < 200; i++) {
        Cell c = in[i];  //! read in sequential run=200 element=16
        c.flags |= 1;
        out[i] = c;  //! write out sequential run=200 element=16
    }
}
