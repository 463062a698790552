// truth: pick channel=2 samples[1200] out[300]
extern "C" void pick(int channel, const short *samples, short *out) {
#pragma HLS INTERFACE m_axi port=samples bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    const short *from = samples;
    switch (channel) {
    case 1: from = samples + 300; break;
    case 2: from = samples + 600; break;
    default: break;
    }
    for (int i = 0; i < 300; i++) out[i] = from[i];  //! read samples sequential run=300 //! write out sequential run=300
}
