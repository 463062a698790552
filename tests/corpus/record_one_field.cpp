// truth: velocities in[300] out[300]
struct Moment {
    float power;
    float velocity;
    float width;
    float snr;
};
extern "C" void velocities(const Moment *in, float *out) {
#pragma HLS INTERFACE m_axi port=in bundle=gmem0
#pragma HLS INTERFACE m_axi port=out bundle=gmem1
    for (int i = 0; i < 300; i++)
        out[i] = in[i].velocity;  //! read in sequential run=300 element=16 tells=partial-record //! write out sequential run=300
}
