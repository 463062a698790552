// truth: apply_gain n=384 raw[384] corrected[384]
struct Ports {
    const short *raw;
    short *corrected;
    int count;
};
static void run(Ports ports, short gain) {
    for (int i = 0; i < ports.count; ++i)
        ports.corrected[i] = ports.raw[i] * gain;  //! read raw sequential run=384 //! write corrected sequential run=384
}
extern "C" void apply_gain(int n, const short *raw, short *corrected) {
#pragma HLS interface m_axi port=raw bundle=gmem0
#pragma HLS interface m_axi port=corrected bundle=gmem1
    Ports ports = {raw, corrected, n};
    run(ports, 5);
}
