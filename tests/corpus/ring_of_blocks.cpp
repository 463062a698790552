// truth: ring rounds=12 in[768] ring_memory[256]
// Twelve blocks go round a ring of four in memory.
extern "C" void ring(int rounds, const int *in, int *ring_memory) {
#pragma HLS INTERFACE m_axi port=in bundle=g0
#pragma HLS INTERFACE m_axi port=ring_memory bundle=g1
    int slot = 0;
    for (int r = 0; r < rounds; r++) {
        for (int i = 0; i < 64; i++) ring_memory[slot * 64 + i] = in[r * 64 + i];  //! write ring_memory sequential run=256 //! read in sequential run=768
        slot = (slot + 1) % 4;
    }
}
