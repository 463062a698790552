// truth: pack_frame in[768] out[768]
// One loop over all gates of all rays; the counters are wrapped by hand.
#define RAYS 12
#define GATES 64
extern "C" void pack_frame(const int *in, int *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    int ray = 0, gate = 0;
    for (int k = 0; k < RAYS * GATES; k++) {
#pragma HLS PIPELINE II=1
        out[ray * GATES + gate] = in[k] << 1;  //! write out sequential run=768 //! read in sequential run=768
        if (++gate == GATES) {
            gate = 0;
            ray++;
        }
    }
}
